import { formatQuantity } from '@nightcone/models';
import type { ArrayComparison, ResultComparison } from '@nightcone/provenance';

/** Where two results differ, one line per array that does. */
export function comparisonText({ arrays, certificate }: ResultComparison): string {
  const lines = arrays.filter(({ verdict }) => verdict !== 'identical').map(lineOf);
  if (certificate === 'different') lines.push('certificate: different');
  return `${lines.join('\n')}\n`;
}

function lineOf(array: ArrayComparison): string {
  switch (array.verdict) {
    case 'identical':
      return `${array.name}: identical`;
    case 'missing':
      return `${array.name}: missing from the ${array.from}`;
    case 'incomparable':
      return `${array.name}: ${array.first} against ${array.second}`;
    case 'different': {
      const { absolute, relative, ulps } = array;
      const steps = ulps ? `, ${ulps.value} ulp` : '';
      return `${array.name}: ${array.count} of ${array.of} differ; at most ${formatQuantity(absolute.value, array.unit, 3)} at [${absolute.index.join(', ')}], relative ${formatQuantity(relative.value, '', 3)}${steps}`;
    }
  }
}
