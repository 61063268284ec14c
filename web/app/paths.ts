/** Every address of the pages. Addresses hold opaque ids, never codes or names. */
import type { PlaceName } from './session.ts';

const inStudy = (study: string, rest: string) => `/studies/${study}/${rest}`;

export const paths = {
  home: '/',
  signIn: '/sign-in',
  account: '/account',
  newPassword: '/new-password',
  help: '/help',
  helpFor: (page: string) => `/help/${page}`,
  accounts: '/accounts',
  securityLog: '/security-log',
  study: (study: string) => `/studies/${study}`,
  subjects: (study: string) => inStudy(study, 'subjects'),
  subject: (study: string, subject: string) => inStudy(study, `subjects/${subject}`),
  imports: (study: string) => inStudy(study, 'import'),
  import: (study: string, id: string) => inStudy(study, `import/${id}`),
  cuts: (study: string) => inStudy(study, 'cuts'),
  cut: (study: string, cut: string) => inStudy(study, `cuts/${cut}`),
  check: (study: string) => inStudy(study, 'check'),
  fit: (study: string) => inStudy(study, 'fit'),
  records: (study: string) => inStudy(study, 'records'),
  record: (study: string, record: string) => inStudy(study, `records/${record}`),
  members: (study: string) => inStudy(study, 'members'),
  setup: (study: string) => inStudy(study, 'setup'),
} as const;

/** Where a place of the row under the top bar leads. */
export function placePath(place: PlaceName, study: string | null): string {
  if (place === 'accounts') return paths.accounts;
  if (place === 'security-log') return paths.securityLog;
  return study ? inStudy(study, place) : paths.home;
}
