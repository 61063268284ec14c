/** Ticks with as many decimals as their step shows. */
import { precisionFixed, tickStep, ticks } from 'd3';
import { formatNumber } from '../../words/numbers.ts';

export type Tick = { at: number; text: string };

export function ticksFor(domain: readonly [number, number], count: number): Tick[] {
  const [from, to] = domain;
  if (!(to > from)) return [{ at: from, text: formatNumber(from, 2) }];
  const decimals = precisionFixed(tickStep(from, to, count));
  return ticks(from, to, count).map((at) => ({ at, text: formatNumber(at, decimals) }));
}

/** A domain that holds all values with a little air; zero belongs to it where asked. */
export function domainOf(values: Iterable<number>, zero = false): [number, number] {
  let from = Number.POSITIVE_INFINITY;
  let to = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value < from) from = value;
    if (value > to) to = value;
  }
  if (!(to >= from)) return [0, 1];
  if (zero) {
    from = Math.min(0, from);
    to = Math.max(0, to);
  }
  if (from === to) {
    const air = Math.abs(from) * 0.1 || 1;
    return zero && from === 0 ? [0, 1] : [from - air, to + air];
  }
  const air = (to - from) * 0.04;
  return [zero && from === 0 ? 0 : from - air, zero && to === 0 ? 0 : to + air];
}
