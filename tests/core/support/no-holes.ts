// Keys whose null means "nothing to say" by the format itself, so no reason stands beside them.
const NULL_IS_AN_ANSWER = new Set(['ols_locked', 'why_not']);

/**
 * Walks a result and names every place that breaks the format's promise: no NaN, no Infinity, no
 * undefined, and no null without a `..._reason` text beside it.
 */
export function holes(value: unknown, path = 'result'): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [`${path} is ${value}`];
  if (value === undefined) return [`${path} is undefined`];
  if (typeof value === 'function' || typeof value === 'symbol') return [`${path} is no data`];
  if (typeof value === 'string')
    return /\b(NaN|Infinity|undefined)\b/.test(value) ? [`${path}: ${value}`] : [];
  if (value === null || typeof value === 'boolean') return [];
  if (Array.isArray(value)) return value.flatMap((item, i) => holes(item, `${path}[${i}]`));
  if (ArrayBuffer.isView(value))
    return [`${path} is a typed array: JSON would write it as an object`];
  const record = value as Record<string, unknown>;
  return Object.entries(record).flatMap(([key, item]) => {
    if (item !== null) return holes(item, `${path}.${key}`);
    if (NULL_IS_AN_ANSWER.has(key)) return [];
    const reason = record[`${key}_reason`];
    return typeof reason === 'string' && reason.trim().length > 10
      ? []
      : [`${path}.${key} is null without a reason`];
  });
}
