/**
 * The shortest decimal that reads back to the same double, without an exponent; minus nought is 0.
 *
 * JavaScript already chooses the shortest digits; only its exponent form has to be unrolled, because
 * a spreadsheet or an importer may read `1e-7` as text.
 *
 * @param value a finite double
 * @throws RangeError for NaN and the infinities, which no reading can hold
 */
export function numberText(value: number): string {
  if (!Number.isFinite(value)) {
    throw new RangeError(`a canonical number must be finite, not ${value}`);
  }
  if (value === 0) {
    return '0';
  }
  const text = String(value);
  const at = text.indexOf('e');
  if (at < 0) {
    return text;
  }
  const sign = text.startsWith('-') ? '-' : '';
  const mantissa = text.slice(sign.length, at);
  const exponent = Number(text.slice(at + 1));
  const [whole = '', fraction = ''] = mantissa.split('.');
  const digits = whole + fraction;
  const point = whole.length + exponent;
  if (point <= 0) {
    return `${sign}0.${'0'.repeat(-point)}${digits}`;
  }
  if (point >= digits.length) {
    return `${sign}${digits}${'0'.repeat(point - digits.length)}`;
  }
  return `${sign}${digits.slice(0, point)}.${digits.slice(point)}`;
}
