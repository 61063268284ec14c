/**
 * Compares a tree of expected numbers with what the engine answered and names each place that is off.
 * Only what is expected is looked at: the engine may say more.
 */
export function differences(got: unknown, want: unknown, relative: number, path = ''): string[] {
  if (want === null) return got === null ? [] : [`${path}: ${show(got)}, expected null`];
  if (typeof want === 'number') return numberOff(got, want, relative, path);
  if (Array.isArray(want)) {
    if (!Array.isArray(got)) return [`${path}: ${show(got)}, expected a list of ${want.length}`];
    if (got.length !== want.length)
      return [`${path}: ${got.length} items, expected ${want.length}`];
    return want.flatMap((item, i) => differences(got[i], item, relative, `${path}[${i}]`));
  }
  if (typeof want === 'object') {
    if (typeof got !== 'object' || got === null)
      return [`${path}: ${show(got)}, expected an object`];
    return Object.entries(want as object).flatMap(([key, value]) =>
      differences((got as Record<string, unknown>)[key], value, relative, `${path}.${key}`),
    );
  }
  return Object.is(got, want) ? [] : [`${path}: ${show(got)}, expected ${show(want)}`];
}

function numberOff(got: unknown, want: number, relative: number, path: string): string[] {
  if (typeof got !== 'number' || !Number.isFinite(got)) {
    return [`${path}: ${show(got)}, expected ${want}`];
  }
  // Below 1e-11 only p values live here, and they keep their relative digits; an exact zero of algebra
  // (a balanced mean, say) is a rounding residue on one of the sides.
  const error = Math.abs(got - want) / Math.max(Math.abs(want), want === 0 ? 1e-6 : 0);
  return error <= relative
    ? []
    : [`${path}: ${got}, expected ${want} (off by ${error.toExponential(2)})`];
}

const show = (value: unknown): string => JSON.stringify(value) ?? 'undefined';
