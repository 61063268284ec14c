/**
 * node --import tsx cr2-repeated.ts FILE REPEATS: the engine's own time, inside the process, for the pooled
 * line with CR0 to CR3, Satterthwaite df and p. `first` and `repeated` start from columns in memory, grouping
 * by subject included; `grouped` starts from readings grouped already. The first call runs code that is not
 * compiled yet; the repeated ones are what a worker thread sees.
 */
import { readFileSync } from 'node:fs';
import papaparse from 'papaparse';
import { clusterBasis } from '../../core/cluster/cluster-basis.ts';
import { clusterContrast } from '../../core/cluster/cluster-line.ts';
import { timeDesign } from '../../core/linear/design.ts';
import { coefficientDirections, fitOls } from '../../core/linear/fit-ols.ts';
import { groupBySubject } from '../../core/table/group-by-subject.ts';
import type { LongTable } from '../../core/table/long-table.ts';
import { median } from './measure.ts';

interface Line {
  subject: string;
  time: string;
  y: string;
}

const [file, repeats] = process.argv.slice(2);
if (file === undefined) throw new Error('the file to read is missing');
const text = readFileSync(file, 'utf8');
const { data } = papaparse.parse<Line>(text, { header: true, skipEmptyLines: true });
const table: LongTable = {
  subject: data.map((d) => d.subject),
  time: Float64Array.from(data, (d) => Number(d.time)),
  response: Float64Array.from(data, (d) => Number(d.y)),
};

function once(): { ms: number; grouped: number; slope: number; se: number; df: number | null } {
  const started = performance.now();
  const grouped = groupBySubject(table);
  const start = performance.now();
  const fit = fitOls(timeDesign(grouped), grouped.response);
  const basis = clusterBasis(fit, grouped.start);
  const contrasts = coefficientDirections(fit).map((h, k) =>
    clusterContrast(basis, h, fit.beta[k]!),
  );
  const ended = performance.now();
  const { estimate, errors, df } = contrasts[1]!;
  return { ms: ended - started, grouped: ended - start, slope: estimate, se: errors.cr1s, df };
}

const first = once();
const more = Array.from({ length: Number(repeats ?? 9) }, once);
console.log(
  JSON.stringify({
    ...first,
    first: first.ms,
    repeated: median(more.map((m) => m.ms)),
    grouped: median(more.map((m) => m.grouped)),
  }),
);
