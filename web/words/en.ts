/**
 * The catalogue: every visible string of the pages, typed. Each noun keeps its own file;
 * they are put together here and nowhere else.
 */
import { accountProblems, accountWords } from './account.ts';
import { accountsProblems, accountsWords } from './accounts.ts';
import { analysisProblems, analysisWords } from './analysis.ts';
import { chartsWords } from './charts.ts';
import { checkWords } from './check.ts';
import {
  chairWord,
  commonProblems,
  commonWords,
  formWords,
  hashWords,
  placeWords,
  progressWords,
  roleWords,
  signingWords,
  stateWords,
  tableWords,
  topBarWords,
} from './common.ts';
import { cutsProblems, cutsWords } from './cuts.ts';
import { entryProblems } from './entry.ts';
import { fitWords } from './fit.ts';
import { helpWords } from './help.ts';
import { homeWords } from './home.ts';
import { importProblems, importWords } from './imports.ts';
import { membersProblems, membersWords } from './members.ts';
import type { ProblemSentences } from './problems.ts';
import { recordsProblems, recordsWords } from './records.ts';
import { securityProblems, securityWords } from './security.ts';
import { setupProblems, setupWords } from './setup.ts';
import { signInProblems, signInWords } from './sign-in.ts';
import { subjectsProblems, subjectsWords } from './subjects.ts';

export const words = {
  common: commonWords,
  topBar: topBarWords,
  roles: roleWords,
  chair: chairWord,
  places: placeWords,
  states: stateWords,
  form: formWords,
  table: tableWords,
  signing: signingWords,
  progress: progressWords,
  hash: hashWords,
  signIn: signInWords,
  home: homeWords,
  help: helpWords,
  account: accountWords,
  members: membersWords,
  setup: setupWords,
  subjects: subjectsWords,
  imports: importWords,
  accounts: accountsWords,
  security: securityWords,
  charts: chartsWords,
  analysis: analysisWords,
  cuts: cutsWords,
  check: checkWords,
  fit: fitWords,
  records: recordsWords,
} as const;

/** Sentences by the code of a problem document. */
export const problems: ProblemSentences = {
  ...commonProblems,
  ...signInProblems,
  ...accountProblems,
  ...membersProblems,
  ...setupProblems,
  ...subjectsProblems,
  ...entryProblems,
  ...importProblems,
  ...accountsProblems,
  ...securityProblems,
  ...analysisProblems,
  ...cutsProblems,
  ...recordsProblems,
};
