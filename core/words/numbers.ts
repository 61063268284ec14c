/** A whole number with a comma between thousands: 1,204. */
export function whole(value: number): string {
  return String(Math.round(value)).replace(/\B(?=(\d{3})+(?!\d))/g, ',');
}

/** A number to three significant digits, without an exponent where that stays readable. */
export function rounded(value: number): string {
  const size = Math.abs(value);
  if (size !== 0 && (size < 1e-4 || size >= 1e7)) return value.toExponential(2);
  return String(Number(value.toPrecision(size >= 1000 ? Math.ceil(Math.log10(size)) : 3)));
}

/** "1 subject", "2 subjects". */
export function counted(count: number, one: string, many: string): string {
  return `${whole(count)} ${count === 1 ? one : many}`;
}

/** Names in a row: "A", "A and B", "A, B and 3 more". */
export function named(names: readonly string[]): string {
  if (names.length <= 1) return names[0] ?? '';
  if (names.length === 2) return `${names[0]} and ${names[1]}`;
  return `${names[0]}, ${names[1]} and ${whole(names.length - 2)} more`;
}
