import { formatQuantity, layoutPlot } from '@nightcone/drawing';
import type { Json } from '@nightcone/models';
import { useMemo } from 'react';
import { useWidth } from '../../../components/use-width.ts';
import { rangeOf } from '../../../plots/built-plot.ts';
import { ribbonWidthNm } from '../../../plots/closed-forms.ts';
import { PlotAxes } from '../../../plots/plot-axes.tsx';
import { PlotMarks } from '../../../plots/plot-marks.tsx';
import { useQuestionForm } from './question-context.ts';

type Profile = { [name: string]: Json };
const list = (value: Json | undefined): number[] => (Array.isArray(value) ? value.map(Number) : []);

/** Value of a profile at u (nm from the centre); for the small drawing beside its inputs. */
export function profileAt(profile: Profile, u: number): number {
  switch (profile.kind) {
    case 'polynomial':
      return list(profile.coefficients).reduceRight((sum, coefficient) => sum * u + coefficient, 0);
    case 'steps': {
      const edges = list(profile.edges);
      const values = list(profile.values);
      const place = edges.findIndex((edge) => u < edge);
      return values[place < 0 ? edges.length : place] ?? Number.NaN;
    }
    case 'sine':
      return Number(profile.amplitude) * Math.sin((2 * Math.PI * u) / Number(profile.periodNm) + Number(profile.phase));
    default:
      return 0;
  }
}

/** The profile across the system as it is typed. */
export function ProfilePlot({
  value,
  unit,
  title,
  symbol,
}: {
  value: Json;
  unit: string;
  title: string;
  symbol: string;
}) {
  const { checked } = useQuestionForm();
  const [ref, width] = useWidth<HTMLDivElement>(280);
  const half = checked.parameters.width === undefined ? 10 : ribbonWidthNm(checked.parameters) / 2 || 10;
  const geometry = useMemo(() => {
    const x = Array.from({ length: 161 }, (_, i) => -half + (i / 80) * half);
    const y = x.map((u) => profileAt(value as Profile, u));
    return layoutPlot(
      {
        caption: title,
        x: { symbol: 'u', unit: 'nm', domain: [-half, half] },
        y: { symbol, unit, domain: rangeOf([y], [-1, 1], 0.1) },
        marks: [{ kind: 'line', role: 'ink', x, y }],
      },
      { width, height: 150 },
    );
  }, [value, unit, title, symbol, half, width]);
  const ends = [-half, half].map((u) => formatQuantity(profileAt(value as Profile, u), unit));
  return (
    <figure className="mb-1 sm:pl-[9.5rem]">
      <div ref={ref}>
        <svg width={width} height={150} aria-hidden="true" className="block overflow-visible">
          <PlotMarks geometry={geometry} />
          <PlotAxes geometry={geometry} />
        </svg>
      </div>
      <figcaption className="sr-only">
        {title}: {ends[0]} at the lower side, {ends[1]} at the upper side.
      </figcaption>
    </figure>
  );
}
