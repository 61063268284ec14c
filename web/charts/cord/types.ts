/** A subject's follow-up as the cord draws it. All days are counted from baseline. */
import type { CordStateWord } from '../../words/charts.ts';

export type CordState = CordStateWord;

export type CordVisit = {
  id: string;
  name: string;
  targetDay: number | null;
  /** The day on which it took place; null while it has not, or where its date is partial. */
  day: number | null;
  windowFrom: number | null;
  windowTo: number | null;
  state: CordState;
  outOfWindow: boolean;
};

/** What a cord's full width stands for, in days since baseline. Cords of one list share one scale. */
export type CordScale = { from: number; to: number };
