/** Who may: the one place where the access of a declaration is held against the person who asks. */
import type { Response } from 'express';
import type { DataSource } from 'typeorm';
import type { Databases } from '../../database/data-source.ts';
import type { Actor } from '../audit/actor.ts';
import type { StudyRole } from '../contracts/common.ts';
import type { StudyMembership } from './membership.ts';
import { membershipOf } from './membership.ts';
import { Problem } from './problems.ts';
import { personOf, requestIdOf, type SignedInPerson } from './request-facts.ts';
import type { RouteDefinition } from './route.ts';

export interface Granted {
  person: SignedInPerson;
  actor: Actor;
  db: DataSource;
  membership?: StudyMembership;
}

/** What a person's duties let them see decides the database role, never the route. */
export function databaseFor(databases: Databases, roles: readonly StudyRole[]): DataSource {
  if (roles.includes('unblinded statistician')) return databases.open;
  if (roles.includes('board member')) return databases.board;
  return databases.masked;
}

/**
 * @param studyUid the `:study` of the path, where the route has one
 * @throws Problem `not_found` also for a study of others, so that its existence stays unknown
 */
export async function grantAccess(
  route: RouteDefinition,
  databases: Databases,
  res: Response,
  studyUid: string | undefined,
): Promise<Granted | null> {
  if (route.access === 'public') return null;
  const person = personOf(res);
  if (!person) throw new Problem('not_signed_in');
  if (person.mustChangePassword && !route.withTemporaryPassword) {
    throw new Problem('password_change_needed');
  }
  const actor: Actor = {
    accountId: person.accountId,
    accountUid: person.accountUid,
    name: person.name,
    role: person.administrator ? 'administrator' : null,
    sessionUid: person.sessionUid,
    requestId: requestIdOf(res),
  };
  if (route.access === 'signed in') return { person, actor, db: databases.masked };
  if (route.access === 'administrator') {
    if (!person.administrator) throw new Problem('administrator_only');
    return { person, actor, db: databases.masked };
  }
  const membership = studyUid
    ? await membershipOf(databases.masked, person.accountId, studyUid)
    : null;
  if (!membership) throw new Problem('not_found');
  const { study: allowed } = route.access;
  const role = allowed.find((candidate) => membership.roles.includes(candidate));
  if (!role) throw new Problem('role_refused', { roles: allowed.join(', ') });
  return {
    person,
    actor: { ...actor, role },
    db: databaseFor(databases, membership.roles),
    membership,
  };
}
