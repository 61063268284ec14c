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
  figure: {
    asTable: 'As table',
    asPicture: 'As picture',
    export: 'Export',
    files: 'Files of this picture',
    kinds: { svg: 'SVG', png: 'PNG', csv: 'CSV' },
    making: 'Making the file.',
    made: (name: string) => `${name} was handed to your browser.`,
    failed:
      'The file could not be made in this browser. Nothing was saved; try SVG or CSV instead.',
    rows: (count: number) => counted(count, 'row', 'rows'),
  },
  spaghetti: {
    drawAs: 'Draw each subject as',
    readings: 'Readings',
    ownLines: 'Own straight lines',
    everyPath: 'Every path',
    ribbons: 'Ribbons by visit',
    manyAs: 'Draw all subjects as',
    subject: 'Subject code',
    subjectHint: 'Type a code to pick it; Esc clears.',
    unknownCode: (code: string) => `No subject ${code} has readings in this picture.`,
    pick: 'Picked subject; arrow keys move between subjects, a typed code picks it, Esc clears',
    nonePicked: 'none picked',
    n: 'n',
    yName: (measure: string, unit: string | null, fromZero: boolean) =>
      `${measure}${unit ? `, ${unit}` : ''}${fromZero ? '' : '; the axis does not begin at 0'}`,
    ended: (count: number) =>
      `follow-up ended early, at the last reading (${counted(count, 'subject', 'subjects')})`,
    few: (line: string) => `the ${line} fades where fewer than five subjects remain`,
    twoReadings: 'dashed: a line through two readings, which has no error',
    ribbonWords: 'ribbons hold the middle half and the middle nine tenths of readings at a visit',
    band: '95 % band',
    one: 'one subject',
    outlying: 'furthest from the middle:',
    columns: { subject: 'subject', group: 'group', time: 'time', value: 'value', visit: 'visit' },
    lineColumns: { slope: 'own slope', intercept: 'own level at 0', n: 'readings' },
    lineUnit: (unit: string | null, per: string) => `${unit ?? ''} ${per}`.trim(),
  },
  residuals: {
    x: 'subjects, in the order of their mean',
    y: (unit: string | null) => `residual${unit ? `, ${unit}` : ''}`,
    span: 'from a subject\u2019s lowest residual to its highest',
    point: 'one residual',
    columns: { subject: 'subject', place: 'order in time', residual: 'residual', mean: 'mean' },
  },
  variogram: {
    x: (unit: string) => `${unit} between two readings of a subject`,
    y: (unit: string | null) => `half squared difference${unit ? `, (${unit})\u00b2` : ''}`,
    total: 'total variance, between subjects',
    within: 'within a subject',
    pairs: 'pairs',
    columns: { lag: 'time apart', value: 'half squared difference', pairs: 'pairs' },
  },
  successive: {
    x: (unit: string | null) => `residual less the subject\u2019s mean${unit ? `, ${unit}` : ''}`,
    y: (unit: string | null) => `the next one${unit ? `, ${unit}` : ''}`,
    columns: { subject: 'subject', place: 'order in time', now: 'residual', next: 'next residual' },
  },
  ratio: {
    x: 'robust error \u00f7 ordinary error, log scale',
    moulton: 'what a stable level of each subject alone would do (Moulton)',
    columns: { coefficient: 'coefficient', ratio: 'robust \u00f7 ordinary', moulton: 'Moulton' },
  },
  interval: {
    estimate: 'estimate',
    lower: 'lower 95 % limit',
    upper: 'upper 95 % limit',
    method: 'method',
    note: 'note',
    upTo: (limit: string) => `unbounded to ${limit}`,
    from: (limit: string) => `${limit} to unbounded`,
  },
} as const;
