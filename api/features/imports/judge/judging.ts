/** What the steps of judging share: the queries run on one connection inside one transaction. */

export type Query = (sql: string, params?: unknown[]) => Promise<unknown>;

export type Judging = {
  studyId: string;
  studyUid: string;
  measureId: string;
  measureUid: string;
  per: 'visit' | 'subject';
  when: 'date' | 'days' | 'visit' | null;
  enrolsNew: boolean;
  /** Sites of the person who imports; subjects elsewhere are unknown to them. */
  siteIds: string[];
  now: Date;
};

/** Reasons a row can be refused for what the study already holds. */
export const rowStudyCodes = [
  'row_subject_unknown',
  'row_site_unknown',
  'row_site_differs',
  'row_new_subject_differs',
  'row_consent_future',
  'row_baseline_before_consent',
  'row_baseline_future',
  'row_not_enrolled',
  'row_no_baseline',
  'row_visit_name',
  'row_visit_not_logged',
  'row_visit_missed',
  'row_visit_date_differs',
  'row_date_future',
  'row_before_consent',
  'row_after_end',
  'row_value_differs',
  'row_duplicate',
  'row_impossible',
  'row_implausible_left_out',
] as const;
