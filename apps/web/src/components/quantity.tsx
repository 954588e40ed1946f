import { formatQuantity, formatSmall, formatWithError } from '../lib/format-quantity.ts';

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
  const shown = small
    ? formatSmall(value, unit)
    : error === undefined
      ? formatQuantity(value, unit)
      : formatWithError(value, error, unit);
  return <span className="num whitespace-nowrap">{shown.text}</span>;
}
