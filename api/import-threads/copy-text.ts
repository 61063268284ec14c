/** Rows as PostgreSQL's COPY text. The order of the columns is the order of the staging table. */
import type { ReadRow } from './read-row.ts';

export const STAGED_COLUMNS = [
  'line',
  'subject_code',
  'value_text',
  'value',
  'choice',
  'limit_sign',
  'limit_value',
  'day_given',
  'date_given',
  'visit_given',
  'replicate',
  'site_given',
  'new_site',
  'new_consent_version',
  'new_consent_date',
  'new_baseline_date',
  'new_reason',
  'new_params',
  'reason',
  'params',
] as const;

export function copyLine(row: ReadRow): string {
  const facts = row.facts;
  const subject = facts?.newSubject ?? null;
  const notEnrolled = facts?.newSubjectRefusal ?? null;
  const cells: (string | number | null)[] = [
    row.line,
    row.subject,
    row.valueText,
    facts?.value ?? null,
    facts?.choice ?? null,
    facts?.limitSign ?? null,
    facts?.limitValue ?? null,
    facts?.day ?? null,
    facts?.date ?? null,
    facts?.visit ?? null,
    facts?.replicate ?? null,
    facts?.site ?? null,
    subject?.site ?? null,
    subject?.consentVersion ?? null,
    subject?.consentDate ?? null,
    subject?.baselineDate ?? null,
    notEnrolled?.code ?? null,
    notEnrolled ? JSON.stringify(notEnrolled.params) : null,
    row.refusal?.code ?? null,
    row.refusal ? JSON.stringify(row.refusal.params) : null,
  ];
  return `${cells.map(escapeCell).join('\t')}\n`;
}

const ESCAPES: Record<string, string> = { '\\': '\\\\', '\t': '\\t', '\n': '\\n', '\r': '\\r' };

function escapeCell(cell: string | number | null): string {
  if (cell === null) return '\\N';
  return String(cell).replace(/[\\\t\n\r]/g, (letter) => ESCAPES[letter] ?? letter);
}
