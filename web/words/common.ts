/** Words that stand on more than one page. */
import { counted, formatCount } from './numbers.ts';
import type { ProblemSentences } from './problems.ts';

export const commonWords = {
  product: 'Tetherline',
  titleOf: (heading: string) => `${heading} · Tetherline`,
  optional: 'optional',
  none: '\u2014',
  previous: (value: string) => `was ${value}`,
  choose: 'Choose',
  cancel: 'Cancel',
  close: 'Close',
  tryAgain: 'Try again',
  save: 'Save',
  any: 'any',
  yes: 'yes',
  no: 'no',
  list: (items: readonly string[]) => new Intl.ListFormat('en-GB').format(items),
} as const;

export const topBarWords = {
  places: 'Places',
  chooseStudy: 'Change study',
  account: 'Account',
  accountOf: (name: string) => `Account of ${name}`,
  skip: 'Skip to the content',
  signOut: 'Sign out',
  help: 'Help',
  findSubject: 'Subject code',
  findSubjectLabel: 'Find a subject by code',
  find: 'Find',
  finding: 'Looking for the subject.',
  notFound: (code: string) => `No subject ${code} that you may see.`,

  administrator: 'administrator of this installation',
  caution:
    'Tetherline is not a medical device. Urgent findings go by the protocol’s own reporting line.',
} as const;

/** Roles in words, with the sites of a coordinator. */
export const roleWords = {
  owner: 'owner',
  coordinator: 'coordinator',
  monitor: 'monitor',
  analyst: 'analyst',
  'unblinded statistician': 'unblinded statistician',
  'board member': 'board member',
  'safety officer': 'safety officer',
  administrator: 'administrator',
} as const;
export const chairWord = 'chair';

export const placeWords = {
  subjects: 'Subjects',
  import: 'Import',
  cuts: 'Cuts',
  check: 'Check',
  records: 'Records',
  members: 'Members',
  setup: 'Set-up',
  accounts: 'Accounts',
  'security-log': 'Security log',
} as const;

export const stateWords = {
  loading: 'Reading the data.',
  failedHeading: 'This could not be shown',
  failed: 'The server could not do this. Nothing was changed.',
  failedNumber: (id: string) => `Number for support: ${id}`,
  forbiddenHeading: 'This page is not open to your role',
  forbidden: 'Your role in this study may not do this.',
  notFoundHeading: 'There is nothing at this address',
  notFound: 'It does not exist, or it is not open to you.',
  notFoundNext: 'Go to the start page',
  signedOut: 'You are signed out.',
  brokenHeading: 'This page has stopped working',
  broken: 'A fault in the page, not in your data. Nothing was sent.',
  reload: 'Load the page again',
} as const;

export const formWords = {
  summary: (count: number) =>
    count === 1
      ? 'One entry needs your attention'
      : `${formatCount(count)} entries need your attention`,
  required: 'Fill this in.',
  tooShort: (least: number) => `Write at least ${counted(least, 'character', 'characters')}.`,
  tooLong: (most: number) => `Write at most ${counted(most, 'character', 'characters')}.`,
  notANumber: 'Write a number, with a point for decimals.',
  notADate: 'Write a day that exists.',
  notAnAddress: 'Write a whole e-mail address, such as name@example.org.',
  tooSmall: (least: string) => `At least ${least}.`,
  tooLarge: (most: string) => `At most ${most}.`,
  chooseOne: 'Choose one.',
  invalid: 'This entry can’t be used as it stands.',
  dateHint: 'Day, month and year',
} as const;

export const tableWords = {
  columns: 'Columns',
  columnsLabel: 'Columns shown',
  exportCsv: 'Export as CSV',
  dense: 'Dense rows',
  shown: (shown: number, total: number, noun: readonly [string, string]) =>
    shown === total
      ? counted(total, noun[0], noun[1])
      : `${formatCount(shown)} of ${counted(total, noun[0], noun[1])}`,
  page: (from: number, to: number, total: number) =>
    `Rows ${formatCount(from)} to ${formatCount(to)} of ${formatCount(total)}`,
  previousPage: 'Earlier rows',
  nextPage: 'Later rows',
  clear: 'clear',
  nothing: 'No row fits these filters.',
  sortedUp: 'ascending',
  sortedDown: 'descending',
  sortNotice: (column: string, down: boolean) =>
    `Sorted by ${column}, ${down ? 'descending' : 'ascending'}.`,
  more: 'More',
} as const;

export const signingWords = {
  name: 'Name',
  time: 'Time',
  timeNow: 'the server’s time at the moment of signing',
  meaning: 'Meaning',
  content: 'Content hash (SHA-256)',
  password: 'Your password',
  passwordHint: 'Entered again, because a signature binds you.',
} as const;

export const progressWords = {
  done: (done: number, total: number) => `${formatCount(done)} of ${formatCount(total)}`,
  waiting: 'Waiting to start',
  cancel: 'Cancel this work',
  cancelled: 'Cancelled. Nothing was kept of it.',
  keepsRunning: 'You may leave this page; the work goes on.',
  lost: 'No word from the server. Asking again.',
} as const;

export const hashWords = { copy: 'Copy', copied: 'Copied.' } as const;

/** Problem codes that any page may meet. */
export const commonProblems: ProblemSentences = {
  unreachable: 'The server can’t be reached. Nothing was sent twice; try again.',
  unexpected_answer: 'The server’s answer is not what this page expects. Load the page again.',
  not_found: 'It does not exist, or it is not open to you.',
  role_refused: 'This is open to: {roles}. The owner of the study gives roles.',
  administrator_only: 'This is open to the administrator of the installation.',
  password_change_needed: 'Your password is a temporary one. Choose your own, then go on.',
  origin_refused: 'The request came from another site. Open Tetherline itself and try again.',
  invalid_request: 'Some entries can’t be used as they stand. Nothing was changed.',
  malformed_json: 'The page sent something the server can’t read. Load the page again.',
  json_expected: 'The page sent something the server can’t read. Load the page again.',
  body_too_large: 'This is more than the server takes at once. Send less at a time.',
  malformed_request: 'The page sent something the server can’t read. Load the page again.',
  stale_version:
    'Someone changed this since you read it. Nothing was overwritten; load the page again, then choose.',
  idempotency_key_form: 'The page sent an unusable key for this act. Load the page again.',
  idempotency_key_reused: 'This act was changed while it was sent. Load the page again.',
  idempotency_running: 'The same act is being done at this moment. Wait for it.',
  already_done: 'This was done already. Load the page again to see the result.',
  busy: 'Others changed the same data at this moment. Nothing was kept; try again.',
  failed: 'The server could not do this. Nothing was changed.',
  not_ready: 'The database or the file storage can’t be reached at this moment. Try again soon.',
  metrics_token_needed: 'Figures about the server are given only with its token.',
  job_finished: 'This work has finished, so it can’t be cancelled.',
};
