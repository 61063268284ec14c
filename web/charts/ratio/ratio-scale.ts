/** The log scale on which ratios of errors are read: ½, 1, 2, 4, and as far as the ratios go. */
import { scaleLog } from 'd3';

const TEXT: Readonly<Record<string, string>> = {
  '0.5': '\u00bd',
  '0.25': '\u00bc',
  '0.125': '\u215b',
};

export type RatioScale = {
  /** Share of the width, in per cent. */
  place: (ratio: number) => number;
  ticks: { at: number; text: string }[];
};

/** A scale by powers of two that clips nothing it was given. */
export function ratioScale(ratios: readonly (number | null)[]): RatioScale {
  const known = ratios.filter((ratio): ratio is number => ratio !== null && ratio > 0);
  const low = Math.min(-1, Math.floor(Math.log2(Math.min(1, ...known)) + 1e-9));
  const high = Math.max(2, Math.ceil(Math.log2(Math.max(1, ...known)) - 1e-9));
  const scale = scaleLog([2 ** low, 2 ** high], [0, 100]).base(2);
  const step = Math.ceil((high - low) / 8);
  const ticks: RatioScale['ticks'] = [];
  for (let power = low; power <= high; power += 1) {
    if (power % step !== 0) continue;
    const at = 2 ** power;
    ticks.push({ at, text: at >= 1 ? String(at) : (TEXT[String(at)] ?? `1/${2 ** -power}`) });
  }
  return { place: (ratio) => Math.min(100, Math.max(0, scale(ratio))), ticks };
}
