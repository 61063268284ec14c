/** Who is signed in, in which study, and where they may go. */
import { queryOptions, useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { type Me, type MyMembership, meSchema, type Place } from '../../api/contracts/auth.ts';
import { api } from './api.ts';
import { queryClient } from './query-client.ts';
import { renewIfDue } from './refresh.ts';

export type { Me };
export type Membership = MyMembership;
export type PlaceName = Place;

/** Studies and duties, as one text: when it changes, nothing read under the old ones may stay. */
let dutiesBefore: string | null = null;

async function fetchMe(): Promise<Me> {
  await renewIfDue();
  const me = await api('/api/me', { answer: meSchema });
  const duties = JSON.stringify([
    me.account.id,
    me.memberships.map(({ study, roles: held, sites }) => [study.id, held, sites]),
  ]);
  if (dutiesBefore !== null && dutiesBefore !== duties) forgetAnswers();
  dutiesBefore = duties;
  return me;
}

/** Empties the store of everything but the session: what is on the page is read again. */
export function forgetAnswers(): void {
  const others = {
    predicate: (query: { queryKey: readonly unknown[] }) => query.queryKey[0] !== 'me',
  };
  queryClient.removeQueries({ ...others, type: 'inactive' });
  void queryClient.resetQueries({ ...others, type: 'active' });
}

export const meQueryOptions = queryOptions({
  queryKey: ['me'],
  queryFn: fetchMe,
  staleTime: 60_000,
});

/** The person who is signed in. Only below the session gate. */
export function useMe(): Me {
  const { data } = useQuery(meQueryOptions);
  if (!data) throw new Error('useMe stands outside the session gate');
  return data;
}

/** The membership of the study in the address; null outside a study. */
export function useMembership(): Membership | null {
  const { study } = useParams();
  return useMe().memberships.find((membership) => membership.study.id === study) ?? null;
}

/** The membership of the study in the address. Only on pages of a study. */
export function useStudy(): Membership {
  const membership = useMembership();
  if (!membership) throw new Error('useStudy stands outside a study');
  return membership;
}

/** The zone that times are shown in: the person's own choice. */
export function useZone(): string {
  return useMe().account.timeZone;
}
