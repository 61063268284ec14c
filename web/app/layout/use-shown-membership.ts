import { useEffect } from 'react';
import { useParams } from 'react-router-dom';
import { type Membership, useMe, useMembership } from '../session.ts';

let lastStudy: string | null = null;

/**
 * The membership the top bar shows: that of the study in the address; on pages outside a study
 * (account, help) the one that was looked at last, or the only one.
 */
export function useShownMembership(): Membership | null {
  const me = useMe();
  const { study } = useParams();
  const here = useMembership();
  useEffect(() => {
    if (study) lastStudy = study;
  }, [study]);
  if (here) return here;
  const last = me.memberships.find((membership) => membership.study.id === lastStudy);
  return last ?? (me.memberships.length === 1 ? (me.memberships[0] ?? null) : null);
}
