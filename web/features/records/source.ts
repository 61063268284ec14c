/** The line that every picture of a record carries out of the page. */
import type { RecordDetail } from '../../../api/contracts/analysis.ts';
import { formatDay } from '../../components/dates.ts';
import { formatCount } from '../../components/numbers.ts';
import { words } from '../../words/en.ts';

export function errorsText(record: RecordDetail, readings: string): string {
  if (record.fit === 'ordinary' && record.stamp) return words.analysis.ordinaryErrors(readings);
  if (record.fit === 'ordinary') return words.analysis.df(record.headline.df);
  return words.analysis.pooledErrors(record.headline.df);
}

export function recordSource(study: string, record: RecordDetail): string {
  const { headline } = record;
  return words.records.source({
    study,
    cut: words.analysis.cutName(record.cut.number, record.cut.name),
    day: formatDay(record.cut.visitCutoff),
    cutHash: record.cutSha256.slice(0, 12),
    specification: words.analysis.specification(record.specification.number, record.measure.label),
    fit: words.analysis.fits[record.fit],
    errors: errorsText(record, formatCount(headline.readings)),
    subjects: headline.subjects,
    readings: headline.readings,
    engine: record.engine,
    seed: record.seed,
    purpose: words.analysis.purposes[record.purpose],
  });
}

export function recordFile(record: RecordDetail, what: string): string {
  return `cut-${record.cut.number}-${record.measure.shortName}-specification-${record.specification.number}-${record.fit}-${what}`;
}
