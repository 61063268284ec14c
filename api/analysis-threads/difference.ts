/** How many rows of a cut are new, changed or gone against another, from the bytes of both. */
import Papa from 'papaparse';

export interface CutDifferenceCounts {
  added: number;
  changed: number;
  gone: number;
}

interface ParsedCut {
  columns: string[];
  rows: Map<string, Map<string, string>>;
}

/**
 * Rows are matched by subject, visit and replicate; unscheduled visits, which share one label, by
 * their day and their order on it too. A row counts as changed when a column that both cuts hold
 * differs, so that a cut of other measures does not call every row changed.
 *
 * @param earlier canonical CSV of the cut compared against
 * @param later canonical CSV of the cut in question
 */
export function differenceOfCuts(earlier: string, later: string): CutDifferenceCounts {
  const before = parseCut(earlier);
  const after = parseCut(later);
  const shared = before.columns.filter((name) => after.columns.includes(name));
  let added = 0;
  let changed = 0;
  for (const [key, row] of after.rows) {
    const old = before.rows.get(key);
    if (old === undefined) {
      added += 1;
    } else if (shared.some((name) => old.get(name) !== row.get(name))) {
      changed += 1;
    }
  }
  let gone = 0;
  for (const key of before.rows.keys()) {
    gone += after.rows.has(key) ? 0 : 1;
  }
  return { added, changed, gone };
}

function parseCut(text: string): ParsedCut {
  const lines = Papa.parse<string[]>(text, { delimiter: ',', newline: '\n', skipEmptyLines: true });
  const [columns = [], ...body] = lines.data;
  const rows = new Map<string, Map<string, string>>();
  const seen = new Map<string, number>();
  for (const cells of body) {
    const row = new Map(columns.map((name, at) => [name, cells[at] ?? '']));
    const base = JSON.stringify([
      row.get('subject'),
      row.get('planned'),
      row.get('visit'),
      row.get('replicate'),
      row.get('planned') === '1' ? '' : row.get('day'),
    ]);
    const nth = (seen.get(base) ?? 0) + 1;
    seen.set(base, nth);
    rows.set(`${base}#${nth}`, row);
  }
  return { columns, rows };
}
