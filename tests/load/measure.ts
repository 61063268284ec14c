/** The middle of several measurements, which a busy moment of the machine moves little. */
export function median(values: readonly number[]): number {
  if (values.length === 0) throw new Error('median of no measurement');
  const sorted = [...values].sort((a, b) => a - b);
  const half = Math.floor(sorted.length / 2);
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}

/** One line of the print: what, ours, theirs, and how many times theirs ours is. */
export function printRatio(what: string, ours: number, theirs: number): void {
  const ratio = ours / theirs;
  const verdict = ratio <= 1 ? 'not slower' : 'SLOWER';
  console.log(
    `  ${what}: ${ms(ours)} against ${ms(theirs)}, ratio ${ratio.toFixed(2)} (${verdict})`,
  );
}

/** One line of the print against a limit in milliseconds. */
export function printLimit(what: string, took: number, limit: number): void {
  console.log(`  ${what}: ${ms(took)} (limit ${ms(limit)}, ${took <= limit ? 'met' : 'NOT MET'})`);
}

export const ms = (value: number): string => `${value.toFixed(value < 100 ? 1 : 0)} ms`;
