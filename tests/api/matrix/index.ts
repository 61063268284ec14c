/** Every line of the table. A noun adds its file here. */
import { accountRows } from './accounts.ts';
import { analysisRows } from './analysis.ts';
import { cutRows } from './cuts.ts';
import { importRows } from './imports.ts';
import { jobRows } from './jobs.ts';
import { memberRows } from './members.ts';
import { recordRows } from './records.ts';
import type { MatrixRow } from './row.ts';
import { lastRows, sessionRows } from './session.ts';
import { subjectRows } from './subjects.ts';

export const matrix: MatrixRow[] = [
  ...sessionRows,
  ...accountRows,
  ...memberRows,
  ...subjectRows,
  ...jobRows,
  ...importRows,
  ...cutRows,
  ...analysisRows,
  ...recordRows,
  ...lastRows,
];
