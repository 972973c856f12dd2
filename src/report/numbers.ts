/** The number with a fixed count of decimals, `.` as decimal mark; empty for null. Throws when it is not finite. */
export function fixed(value: number | null, decimals: number): string {
  if (value === null) return "";
  const text = finite(value).toFixed(decimals);
  return Number(text) === 0 ? text.replace("-", "") : text;
}

/** The number rounded to eight significant digits: more than any figure here is worth, and the same on every machine. */
export function rounded(value: number): number {
  return Number(finite(value).toPrecision(8)) + 0;
}

/** The value itself. Throws when it is NaN or infinite: what can't be measured is null, so this is a failure of ours. */
export function finite(value: number): number {
  if (!Number.isFinite(value)) throw new Error(`a result holds ${value}, which is never written`);
  return value;
}

/** A figure for reading, rounded so that the half width of its interval keeps two significant digits. */
export function readable(value: number, halfWidth: number | null): string {
  const decimals = halfWidth !== null && halfWidth > 0 ? 1 - exponentOf(halfWidth) : null;
  if (decimals === null) return readableAlone(value);
  return withMinus(fixed(value, Math.min(6, Math.max(0, decimals))));
}

/** A figure for reading that has no interval: four significant digits, without zeros at the end. */
export function readableAlone(value: number): string {
  if (Number.isInteger(value) && Math.abs(value) < 1e9) return withMinus(String(value + 0));
  const size = Math.abs(finite(value));
  if (size >= 1e6 || size < 1e-4) return withMinus(trimmed(value.toPrecision(4)));
  return withMinus(trimmed(fixed(value, Math.max(0, 3 - exponentOf(size)))));
}

/** A value with its standard uncertainty, to two digits of that: `0.4940 ± 0.0010`. The value alone when it has none. */
export function withUncertainty(value: number, uncertainty: number): string {
  if (uncertainty <= 0) return readableAlone(value);
  return `${readable(value, uncertainty)} ± ${readable(uncertainty, uncertainty)}`;
}

/** A decimal number without zeros at its end: `0.8000` is `0.8`. */
function trimmed(text: string): string {
  return text.replace(/(\.\d*?)0+(?=e|$)/, "$1").replace(/\.(?=e|$)/, "");
}

/** Power of ten of the leading digit, read from the exact decimal writing. */
function exponentOf(value: number): number {
  return Number(value.toExponential().split("e")[1]);
}

function withMinus(text: string): string {
  return text.replaceAll("-", "\u2212");
}
