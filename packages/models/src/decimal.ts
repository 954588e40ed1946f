/**
 * Exact decimal numbers: value = digits · 10^exponent. Powers of ten are shifted in the decimal text, which is parsed
 * once at the end, so that 0.9 meV and 0.0009 eV are the same double (0.9 * 1e-3 would be another one).
 */
export interface Decimal {
  readonly digits: bigint;
  readonly exponent: number;
}

const decimalPattern = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,4}))?$/;
/** Longer texts are refused: no quantity needs them, and arithmetic on them would take long. */
const maxLength = 400;

/** The decimal in a text such as `0.9`, `-1e-3`, `+2` or `.5`; undefined where it is none. A true minus sign counts. */
export function parseDecimal(text: string): Decimal | undefined {
  const match = text.length > maxLength ? null : decimalPattern.exec(text.trim().replace('−', '-'));
  const [, sign = '', whole = '', fraction = '', power = '0'] = match ?? [];
  if (match === null || whole.length + fraction.length === 0) return undefined;
  const digits = BigInt(whole + fraction);
  return reduced(sign === '-' ? -digits : digits, Number(power) - fraction.length);
}

/** The shortest decimal that reads back as this double. Throws on NaN and infinities. */
export function decimalOf(value: number): Decimal {
  const decimal = parseDecimal(String(value));
  if (decimal === undefined) throw new RangeError(`${value} is no finite number`);
  return decimal;
}

/** Canonical text: plain where it is short, else with an exponent; equal decimals have equal texts. */
export function decimalText({ digits, exponent }: Decimal): string {
  const { digits: bare, exponent: power } = reduced(digits, exponent);
  const sign = bare < 0n ? '-' : '';
  const figures = String(bare < 0n ? -bare : bare);
  const point = figures.length + power;
  if (power >= 0 && point <= 21) return `${sign}${figures}${'0'.repeat(power)}`;
  if (power < 0 && point > 0) return `${sign}${figures.slice(0, point)}.${figures.slice(point)}`;
  if (power < 0 && point > -6) return `${sign}0.${'0'.repeat(-point)}${figures}`;
  const tail = figures.length > 1 ? `.${figures.slice(1)}` : '';
  return `${sign}${figures[0]}${tail}e${point - 1}`;
}

/** The double nearest to the decimal (parsed once from its text); never -0. Throws RangeError beyond the doubles. */
export function decimalNumber(decimal: Decimal): number {
  const value = Number(decimalText(decimal));
  if (!Number.isFinite(value)) throw new RangeError(`${decimalText(decimal)} is beyond the range of doubles`);
  return value === 0 ? 0 : value;
}

/** decimal · 10^places, exactly. */
export function shiftDecimal({ digits, exponent }: Decimal, places: number): Decimal {
  return { digits, exponent: exponent + places };
}

export function addDecimals(a: Decimal, b: Decimal): Decimal {
  const [fine, coarse] = a.exponent < b.exponent ? [a, b] : [b, a];
  return reduced(fine.digits + scaled(coarse, fine.exponent), fine.exponent);
}

export function subtractDecimals(a: Decimal, b: Decimal): Decimal {
  return addDecimals(a, { digits: -b.digits, exponent: b.exponent });
}

export function multiplyDecimals(a: Decimal, b: Decimal): Decimal {
  return reduced(a.digits * b.digits, a.exponent + b.exponent);
}

/** Significant digits to which a quotient that is no finite decimal is rounded. */
const quotientDigits = 17;

/**
 * a / b. Exact where the quotient is a finite decimal; else rounded half to even to 17 significant digits, from the
 * exact fraction. The later parse to a double rounds once more. Throws RangeError for b = 0.
 */
export function divideDecimals(a: Decimal, b: Decimal): Decimal {
  if (b.digits === 0n) throw new RangeError('division by zero');
  const negative = a.digits < 0n !== b.digits < 0n;
  const numerator = a.digits < 0n ? -a.digits : a.digits;
  const denominator = b.digits < 0n ? -b.digits : b.digits;
  const common = greatestCommonDivisor(numerator, denominator);
  const quotient = divideReduced(numerator / common, denominator / common);
  return reduced(negative ? -quotient.digits : quotient.digits, quotient.exponent + a.exponent - b.exponent);
}

/** numerator / denominator for positive coprime integers. */
function divideReduced(numerator: bigint, denominator: bigint): Decimal {
  let rest = denominator;
  let places = 0;
  // a finite decimal has no prime factors but 2 and 5; each step of 10 removes one of either
  for (; rest % 10n === 0n; places++) rest /= 10n;
  for (; rest % 2n === 0n; places++) rest /= 2n;
  for (; rest % 5n === 0n; places++) rest /= 5n;
  if (rest === 1n) return { digits: (numerator * 10n ** BigInt(places)) / denominator, exponent: -places };
  let shift = quotientDigits - String(numerator).length + String(denominator).length;
  if (ratioDigits(numerator, denominator, shift) > quotientDigits) shift -= 1;
  const [top, bottom] = scaleRatio(numerator, denominator, shift);
  const floor = top / bottom;
  const twice = 2n * (top - floor * bottom);
  const up = twice > bottom || (twice === bottom && floor % 2n === 1n);
  return { digits: up ? floor + 1n : floor, exponent: -shift };
}

const scaleRatio = (top: bigint, bottom: bigint, shift: number): [bigint, bigint] =>
  shift >= 0 ? [top * 10n ** BigInt(shift), bottom] : [top, bottom * 10n ** BigInt(-shift)];

function ratioDigits(numerator: bigint, denominator: bigint, shift: number): number {
  const [top, bottom] = scaleRatio(numerator, denominator, shift);
  return String(top / bottom).length;
}

function greatestCommonDivisor(a: bigint, b: bigint): bigint {
  let [x, y] = [a, b];
  while (y !== 0n) [x, y] = [y, x % y];
  return x === 0n ? 1n : x;
}

const scaled = (decimal: Decimal, exponent: number) => decimal.digits * 10n ** BigInt(decimal.exponent - exponent);

/** The same value without trailing zeros; zero is 0 · 10⁰. */
function reduced(digits: bigint, exponent: number): Decimal {
  if (digits === 0n) return { digits: 0n, exponent: 0 };
  let [bare, power] = [digits, exponent];
  for (; bare % 10n === 0n; power++) bare /= 10n;
  return { digits: bare, exponent: power };
}
