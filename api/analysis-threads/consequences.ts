/** What taking repeated readings as independent would do to each coefficient, and in which direction. */
import type { Consequence } from './jobs.ts';

/** A ratio of errors within five per cent of one changes no decision. */
const ABOUT_RIGHT = 1.05;

export function directionOf(ratio: number | null): Consequence['ordinaryErrorIs'] {
  if (ratio === null || !(ratio > 0)) {
    return 'unknown';
  }
  if (ratio > ABOUT_RIGHT) {
    return 'too small';
  }
  return ratio < 1 / ABOUT_RIGHT ? 'too large' : 'about right';
}
