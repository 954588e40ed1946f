import { limits, type SweepAxisInput } from '@nightcone/contracts';
import {
  type Json,
  type ModelManifest,
  parseQuantity,
  partOf,
  pointerTokens,
  rangeAxis,
  type Specification,
  type SweepAxis,
  typeAt,
} from '@nightcone/models';
import { Refusal } from '../refusal.ts';

const refuse = (field: string, message: string, value: Json | undefined, limit: string) =>
  new Refusal('invalid-specification', message, { errors: [{ field, message, value, limit }] });

/** Axes with their values; ranges are made in exact decimals. Counts are checked before any value is made. */
export function expandAxes(model: ModelManifest, base: Specification, axes: readonly SweepAxisInput[]): SweepAxis[] {
  let points = 1;
  for (const [index, axis] of axes.entries()) {
    if ((axis.values === undefined) === (axis.range === undefined))
      throw refuse(`/axes/${index}`, 'An axis has either values or a range.', undefined, 'one of the two');
    points *= axis.range?.count ?? axis.values?.length ?? 0;
    if (points > limits.sweepPoints) throw tooManyPoints(axes, index);
  }
  return axes.map((axis, index) =>
    axis.range
      ? expandRange(model, base, axis, axis.range, index)
      : { pointers: axis.pointers, values: axis.values ?? [] },
  );
}

function tooManyPoints(axes: readonly SweepAxisInput[], index: number): Refusal {
  const counts = axes.map(({ range, values }) => range?.count ?? values?.length ?? 0);
  const asked = counts.reduce((product, count) => product * count, 1);
  const most = limits.sweepPoints.toLocaleString('en');
  const message = `${counts.map((count) => count.toLocaleString('en')).join(' × ')} points; a sweep has at most ${most}.`;
  const axis = axes[index];
  return new Refusal('too-many-points', message, {
    errors: [
      {
        field: axis?.range ? `/axes/${index}/range/count` : `/axes/${index}/values`,
        message,
        value: counts[index],
        limit: most,
      },
    ],
    figures: { points: asked, limit: limits.sweepPoints },
  });
}

function expandRange(
  model: ModelManifest,
  base: Specification,
  { pointers }: SweepAxisInput,
  range: NonNullable<SweepAxisInput['range']>,
  index: number,
): SweepAxis {
  const field = `/axes/${index}/range`;
  const [pointer, second] = pointers;
  if (pointer === undefined || second !== undefined)
    throw refuse(field, 'A range is for one pointer; zipped axes list their values.', undefined, 'one pointer');
  // Units are read where the place is a number with one; elsewhere the texts must be bare numbers.
  const part = partOf(model, pointer);
  const type = part && typeAt(model[part], base[part], pointerTokens(pointer));
  const unit = type && 'unit' in type ? type.unit : '';
  const end = (name: 'start' | 'stop') => {
    const read = parseQuantity(range[name], unit);
    if (!read.ok)
      throw refuse(`${field}/${name}`, read.message, range[name], unit ? `a number in ${unit}` : 'a number');
    return read.value;
  };
  const [start, stop] = [end('start'), end('stop')];
  return rangeAxis(pointer, { start, stop, count: range.count });
}
