import { describe, expect, it } from 'vitest';
import { canonicalJson } from '../../api/analysis-threads/canonical-json.ts';
import { check, fit as runFit } from '../../api/analysis-threads/worker.ts';
import { pictureSchema } from '../../api/contracts/analysis.ts';
import {
  analysisResultSchema,
  independenceSchema,
  structureSchema,
} from '../../api/contracts/analysis-result.ts';

interface Row {
  subject: string;
  day: number;
  y: number;
  group?: string;
}

function bytesOf(rows: readonly Row[]): Uint8Array {
  const lines = rows.map(
    (row) => `${row.subject},s,V${row.day},1,${row.day},${row.day},1,${row.group ?? ''},${row.y},`,
  );
  const header = 'subject,site,visit,planned,day,planned_day,replicate,group,y,y_note';
  return new TextEncoder().encode(`${[header, ...lines].join('\n')}\n`);
}

const grid = (
  subjects: number,
  days: readonly number[],
  y: (subject: number, day: number) => number,
): Row[] =>
  Array.from({ length: subjects }, (_, at) =>
    days.map((day) => ({
      subject: `S${at}`,
      day,
      y: y(at, day),
      group: at % 2 === 0 ? 'even' : 'odd',
    })),
  ).flat();

const wave = (subject: number, day: number) => Math.sin(7 * subject + 3 * day) + subject;

const tables: [string, Row[]][] = [
  ['an ordinary table', grid(9, [0, 1, 2, 3], wave)],
  ['two subjects', grid(2, [0, 1, 2], wave)],
  ['two readings each of four subjects', grid(4, [0, 5], wave)],
  ['a constant response', grid(6, [0, 1, 2], () => 4)],
  ['a perfect line', grid(6, [0, 1, 2], (_, day) => 2 + day)],
  ['identical readings of each subject', grid(6, [0, 1, 2], (subject) => subject * subject)],
  [
    'one reading each',
    grid(8, [0], wave).map((row, at) => ({ ...row, day: at, group: row.group })),
  ],
  [
    'readings that alternate within subject',
    grid(8, [0, 1, 2, 3], (subject, day) => (day % 2 === 0 ? 1 : -1) * (1 + subject / 100)),
  ],
  [
    'one subject alone at a far time',
    [...grid(5, [0, 1], wave), { subject: 'far', day: 900, y: 3, group: 'even' }],
  ],
  ['replicates at one time', [...grid(5, [0, 1, 2], wave), ...grid(5, [1], (s) => wave(s, 9))]],
];

describe.each(tables)('%s', (_what, rows) => {
  const job = (group: boolean) => ({
    bytes: bytesOf(rows),
    sha256: 'f'.repeat(64),
    specification: { measure: 'y', axis: 'since_baseline', unit: 'days', group } as const,
    seed: 1,
  });

  it.each([false, true])('answers within the contract or refuses in words (group: %s)', (group) => {
    const opened = check(job(group));
    if (!opened.ok) {
      expect(group).toBe(true);
      expect(['collinear', 'too_few_readings', 'one_level']).toContain(opened.code);
      return;
    }
    const parts = JSON.parse(opened.text);
    structureSchema.parse(parts.structure);
    independenceSchema.parse(parts.independence);
    // Throws on NaN and the infinities, which JSON.stringify would turn into null unseen.
    canonicalJson(opened.consequences.map((one) => ({ ...one })));
    canonicalJson([...opened.observed, ...opened.dealt].map((own) => [own.mean, ...own.residuals]));
    for (const kind of ['pooled', 'ordinary'] as const) {
      const run = runFit({
        ...job(group),
        record: {
          cut: { uid: 'c', number: 1, name: 'n', visitCutoff: '2026-01-01', sha256: 'f' },
          specification: { ...job(group).specification, sha256: 's', number: 1 },
          fit: kind,
          purpose: 'planned',
          acknowledgement: { by: 'b', at: 'a', reason: 'because the test asks for it' },
          seed: 1,
          createdBy: 'b',
          createdAt: 'a',
        },
        ids: new Map(),
        ended: [],
      });
      if (!run.ok) {
        throw new Error(run.code);
      }
      analysisResultSchema.parse(JSON.parse(run.resultText));
      const picture = pictureSchema.parse(JSON.parse(run.pictureText));
      expect(picture.band.flatMap((band) => band.points)).toHaveLength(group ? 98 : 49);
      for (const point of picture.band.flatMap((band) => band.points)) {
        for (const value of [point.estimate, point.lower, point.upper, point.df]) {
          expect(value === null || Number.isFinite(value)).toBe(true);
        }
      }
    }
  });
});
