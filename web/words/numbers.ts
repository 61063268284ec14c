/**
 * Numbers as we print them: U+2212 for minus, thin spaces between thousands past 9,999,
 * digits chosen from the error. Kept beside the words because sentences need them too.
 */
const MINUS = '\u2212';
const THIN = '\u2009';
const NONE = '\u2014';

/** A number with a fixed count of decimals; a number that is not there is a dash. */
export function formatNumber(value: number | null | undefined, decimals = 0): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return NONE;
  const digits = Math.abs(value).toFixed(Math.max(0, Math.min(20, decimals)));
  const [whole = '0', fraction] = digits.split('.');
  // Four digits read as one figure; longer ones are grouped.
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, THIN) : whole;
  const text = fraction === undefined ? grouped : `${grouped}.${fraction}`;
  // What rounds to nothing has no sign.
  return value < 0 && /[1-9]/.test(digits) ? MINUS + text : text;
}

/** A count of things. */
export function formatCount(value: number): string {
  return formatNumber(value, 0);
}

/** Decimals that show two significant digits of an error: 0.0176 → 3, 0.62 → 2, 12.3 → 0. */
export function decimalsForError(error: number | null | undefined): number | null {
  if (error === null || error === undefined || !Number.isFinite(error) || error <= 0) return null;
  // Rounded first: 0.0996 is 0.10, which has two decimals and not three.
  const rounded = Number(error.toPrecision(2));
  return Math.max(0, Math.min(12, 1 - Math.floor(Math.log10(rounded) + 1e-12)));
}

/** Three significant digits, for a number that stands without an error. */
export function formatLoose(value: number | null | undefined): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return NONE;
  if (value === 0) return '0';
  const rounded = Number(value.toPrecision(3));
  return formatNumber(
    rounded,
    Math.max(0, Math.min(12, 2 - Math.floor(Math.log10(Math.abs(rounded)) + 1e-12))),
  );
}

/** An estimate with as many decimals as its error shows. */
export function formatEstimate(
  estimate: number | null | undefined,
  error: number | null | undefined,
): string {
  const decimals = decimalsForError(error);
  return decimals === null ? formatLoose(estimate) : formatNumber(estimate, decimals);
}

/** An error with two significant digits. */
export function formatError(error: number | null | undefined): string {
  const decimals = decimalsForError(error);
  return decimals === null ? formatLoose(error) : formatNumber(error, decimals);
}

/** "−0.080 to −0.042"; decimals from the error where given, else from the width of the interval. */
export function formatInterval(
  lower: number | null | undefined,
  upper: number | null | undefined,
  error?: number | null,
): string {
  if (lower === null || lower === undefined || upper === null || upper === undefined) return NONE;
  const decimals = decimalsForError(error ?? (upper - lower) / 4) ?? 2;
  return `${formatNumber(lower, decimals)} to ${formatNumber(upper, decimals)}`;
}

/** p to three decimals, never "0.000". */
export function formatP(p: number | null | undefined): string {
  if (p === null || p === undefined || !Number.isFinite(p)) return NONE;
  return p < 0.001 ? `< ${formatNumber(0.001, 3)}` : formatNumber(p, 3);
}

/** A ratio or a correlation: two decimals. */
export function formatRatio(ratio: number | null | undefined): string {
  return formatNumber(ratio, 2);
}

/** Degrees of freedom: one decimal where it is not whole. */
export function formatDf(df: number | null | undefined): string {
  if (df === null || df === undefined || !Number.isFinite(df)) return NONE;
  return Number.isInteger(df) ? formatNumber(df, 0) : formatNumber(df, 1);
}

/** A share of one as a whole percentage. */
export function formatShare(share: number | null | undefined): string {
  if (share === null || share === undefined || !Number.isFinite(share)) return NONE;
  return `${formatNumber(share * 100, 0)}\u00a0%`;
}

/** "3 subjects", "1 subject". */
export function counted(count: number, one: string, many: string): string {
  return `${formatCount(count)} ${count === 1 ? one : many}`;
}
