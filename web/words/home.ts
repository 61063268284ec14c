/** The start page: which study, and what may I do in it. */
import { counted } from './numbers.ts';

export const homeWords = {
  chooseHeading: 'Choose a study',
  chooseSentence: (count: number) => `You belong to ${counted(count, 'study', 'studies')}.`,
  noneHeading: 'You belong to no study yet',
  noneSentence:
    'An owner adds you to a study by the e-mail address of your account. Nothing is open to you before.',
  administratorHeading: 'You look after the accounts of this installation',
  administratorSentence: 'An administrator sees accounts and the security log, and no study data.',
  masked: 'masked',
  notMasked: 'not masked',
  locked: 'locked',
  closed: 'closed',
  yourRole: 'Your role',
  study: 'Study',
  states: 'State',
  studiesNoun: ['study', 'studies'],
  headings: {
    owner: 'You own this study',
    coordinator: 'You coordinate this study',
    monitor: 'You monitor this study',
    analyst: 'You analyse this study',
    'unblinded statistician': 'You are the unblinded statistician of this study',
    'board member': 'You sit on the monitoring board of this study',
    'safety officer': 'You are the safety officer of this study',
  },
  places: {
    subjects: 'Read subjects with their visits and readings.',
    import: 'Bring in a file of readings, checked before anything is kept.',
    cuts: 'Freeze the readings at a date, so that an analysis has something fixed to stand on.',
    check: 'See what repeated readings do to an analysis, before any fit.',
    records: 'Find analyses again, with everything needed to repeat them.',
    members: 'Say who holds which duty in this study.',
    setup: 'Read sites, arms, measures and the schedule of visits.',
    accounts: 'Create accounts, disable them, and give new passwords.',
    'security-log': 'Read who signed in, from where, and what was changed about accounts.',
  },
  readOnly: {
    cuts: 'Read the frozen cuts of this study.',
    records: 'Read the analyses made on those cuts.',
  },
  roles: {
    'unblinded statistician':
      'The allocation and its key are sealed away from everyone else. The pages to prepare and release a packet for the board are not in this version, so there is nothing for you to open here.',
    'board member':
      'A board member sees only what is released to the board. Nothing can be released in this version, so there is nothing for you to open here.',
    'safety officer':
      'The list of alerts and adverse events is not in this version, so there is nothing for you to open here. Urgent findings go by the protocol’s own reporting line.',
  },
  severalHeading: (roles: string) => `Your duties in this study: ${roles}`,
  maskedSentence: (study: string) => `${study} is masked: no page shows which arm a subject is in.`,
  openSentence: (study: string) => `${study} is not masked: arms are open to its members.`,
} as const;
