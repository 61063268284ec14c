/** English of the commands that keep an installation: migrate, first-owner, verify-audit. */
import type { BrokenLink, BrokenLinkCode } from '../audit/verify.ts';

const brokenWords: Record<BrokenLinkCode, string> = {
  'entry missing': 'the entry is missing',
  'previous hash differs': 'the entry does not follow from the one before it',
  'hash differs': 'the entry was changed after it was written',
  'columns differ': 'a column of the entry was changed after it was written',
  'head differs': 'the head of the chain does not belong to its last entry',
  'anchor differs': 'the entry is not the one whose hash was stored outside the database',
  'anchored entry missing': 'the entry was stored outside the database and is gone from it',
};

export const commandWords = {
  migrated: (names: readonly string[]) =>
    names.length === 0
      ? 'The database was up to date. Rights were granted again.'
      : `The database is up to date: ${names.join(', ')}.`,

  auditWhole: (chains: number, entries: number, anchors: number) =>
    `The audit trail holds: ${entries} entries in ${chains} chains, compared with ${anchors} heads stored outside the database.`,
  auditBroken: (link: BrokenLink) =>
    `Chain ${link.chain}, entry ${link.seq}: ${brokenWords[link.code]}.`,
  auditNextStep:
    'Keep the database as it is, and tell those who answer for the study. Restore into another database to compare.',

  firstOwnerUsage: [
    'npm run first-owner -- --admin EMAIL --owner EMAIL --setup FILE [--admin-name NAME] [--owner-name NAME]',
    '',
    'Makes the first administrator, owner and study. Both passwords are asked; without a terminal they are',
    'the first two lines of standard input, the administrator’s first.',
  ].join('\n'),
  firstOwnerMissing: (flag: string) => `${flag} is missing.`,
  firstOwnerDemo:
    'This installation shows the demo, which has its accounts. Set DEMO=off, or DATABASE_URL to your own database.',
  firstOwnerFile: (file: string, reason: string) => `${file} can’t be read: ${reason}`,
  firstOwnerPasswordsMissing:
    'Standard input holds fewer than two lines: the administrator’s password, then the owner’s.',
  askPassword: (who: string) => `Password of the ${who}: `,
  askAgain: (who: string) => `Password of the ${who}, again: `,
  passwordsDiffer: 'The two passwords differ. Nothing was made.',
  firstOwnerDone: (study: string, owner: string, administrator: string) =>
    `Made study “${study}” with its owner ${owner}, and administrator ${administrator}.`,
  nothingMade: 'Nothing was made.',
};
