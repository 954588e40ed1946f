import { formatQuantity as formatWithError } from '@nightcone/drawing';
import { formatSmall } from '../lib/format-quantity.ts';

/** A number with unit, sensible prefix and error: `36.302(4) meV`. */
export function Quantity({
  value,
  unit,
  error,
  small = false,
}: {
  value: number;
  unit: string;
  error?: number;
  /** Sizes of errors and residuals: two figures and a power of ten. */
  small?: boolean;
}) {
  return (
    <span className="num whitespace-nowrap">
      {small ? formatSmall(value, unit) : formatWithError(value, unit, error ?? null)}
    </span>
  );
}
