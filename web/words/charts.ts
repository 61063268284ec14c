/** Words that stand in or beside pictures. */
import { counted, formatNumber } from './numbers.ts';

export type CordStateWord =
  | 'upcoming'
  | 'open'
  | 'closing'
  | 'overdue'
  | 'done'
  | 'partly done'
  | 'missed'
  | 'unscheduled';

const day = (value: number) => `day ${formatNumber(Math.round(value))}`;

export const chartsWords = {
  cord: {
    axisWeeks: 'Follow-up, weeks since baseline',
    axisDays: 'Follow-up, days since baseline',
    legend: 'What the marks of a cord mean',
    legendOf: {
      done: 'done',
      'partly done': 'partly done',
      missed: 'missed',
      open: 'open, with its window',
      closing: 'closing, with its window',
      overdue: 'overdue',
      upcoming: 'upcoming',
      unscheduled: 'unscheduled',
      outOfWindow: 'out of window',
      ended: 'follow-up ended',
    },
    knot: (visit: {
      name: string;
      state: CordStateWord;
      at: number | null;
      windowFrom: number | null;
      windowTo: number | null;
      outOfWindow: boolean;
    }) => {
      const parts = [`${visit.name}: ${visit.state}`];
      if (visit.at !== null) parts.push(day(visit.at));
      if (visit.outOfWindow) parts.push('out of window');
      if (visit.windowFrom !== null && visit.windowTo !== null)
        parts.push(`window ${day(visit.windowFrom)} to ${day(visit.windowTo)}`);
      return parts.join(', ');
    },
    summary: (
      counts: readonly { state: CordStateWord; count: number; names: readonly string[] }[],
      outOfWindow: number,
      end: string | null,
    ) => {
      if (counts.length === 0) return 'No visit is planned or logged.';
      const parts = counts.map(({ state, count, names }) =>
        state === 'overdue' || state === 'open' || state === 'closing' || state === 'missed'
          ? `${count} ${state} (${names.join(', ')})`
          : `${count} ${state}`,
      );
      if (outOfWindow > 0) parts.push(`${outOfWindow} out of window`);
      const visits = counts.reduce((sum, each) => sum + each.count, 0);
      return `${counted(visits, 'visit', 'visits')}: ${parts.join(', ')}${end ? `. Follow-up ended: ${end}` : ''}.`;
    },
  },
} as const;
