/** Refusals around accounts and memberships. */
import { defineProblems } from './problem-words.ts';

export const memberProblems = defineProblems({
  account_exists: {
    status: 409,
    title: 'Address in use',
    detail: 'An account with this address exists already.',
  },
  account_own: {
    status: 409,
    title: 'Your own account',
    detail: 'You can’t do this to your own account. Ask another administrator.',
  },
  account_last_administrator: {
    status: 409,
    title: 'The last administrator stays',
    detail: 'This is the last administrator who can sign in. Make another one first.',
  },
  account_already: {
    status: 409,
    title: 'Already so',
    detail: 'The account is {state} already.',
  },
  member_no_account: {
    status: 422,
    title: 'No such account',
    detail: 'No account with this address can be added. Ask the administrator to create it.',
  },
  member_already: {
    status: 409,
    title: 'Member already',
    detail: 'This person belongs to the study already. Change their duties instead.',
  },
  member_administrator: {
    status: 422,
    title: 'An administrator holds no duty',
    detail:
      'An administrator sees accounts and never study data, so this account can’t hold a duty in a study. Use another account of the person.',
  },
  duties_exclude: {
    status: 422,
    title: 'Duties that exclude each other',
    detail: 'A person who is {first} can’t also be {second} in the same study: {why}',
  },
  member_last_owner: {
    status: 409,
    title: 'The last owner stays',
    detail: 'A study keeps at least one owner who can sign in. Make somebody else owner first.',
  },
  coordinator_needs_site: {
    status: 422,
    title: 'Site missing',
    detail: 'A coordinator works at one or more sites. Choose them.',
  },
  sites_without_coordinator: {
    status: 422,
    title: 'Sites without a coordinator',
    detail: 'Sites are chosen for a coordinator only. Take them away, or add that duty.',
  },
  site_unknown: {
    status: 422,
    title: 'Site not in this study',
    detail: 'One of the chosen sites does not belong to this study.',
  },
  chair_needs_board: {
    status: 422,
    title: 'Chair of the board only',
    detail: 'The chair is one of the board members. Add that duty, or take the mark away.',
  },
  study_closed: {
    status: 409,
    title: 'Study closed',
    detail: 'The study is closed; its members no longer change.',
  },
  job_finished: {
    status: 409,
    title: 'Finished already',
    detail: 'This work has finished, so it can’t be cancelled.',
  },
});

/** Why two duties exclude each other. */
export const exclusionReasons = {
  'unblinded statistician':
    'who knows the allocation takes no other part, so that nobody else learns of it.',
  'board member': 'the board judges the study and takes no part in running it.',
} as const;
