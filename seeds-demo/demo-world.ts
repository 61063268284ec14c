/** Who acts in the demo, when, and in which study: the services are called as the routes would call them. */
import type { Actor } from '../api/audit/actor.ts';
import { inTransaction } from '../api/audit/transaction.ts';
import type { StudyRole } from '../api/contracts/common.ts';
import { type SetupFileInput, setupFileSchema } from '../api/contracts/setup.ts';
import type { StudyScope } from '../api/features/cuts/scope.ts';
import { addMember } from '../api/features/members/service.ts';
import { accountWithPassword, foundStudy } from '../api/features/setup/first-owner.ts';
import { actInStudy, type StudyAct } from '../api/features/subjects/study-act.ts';
import type { AppDeps } from '../api/http/deps.ts';
import { membershipOf, type StudyMembership } from '../api/http/membership.ts';

export type DemoDeps = Pick<AppDeps, 'databases' | 'store' | 'threads' | 'importThreads'>;

/** The past, played in order: each event says when it happens. */
export class DemoClock {
  now: Date;

  constructor(start: Date) {
    this.now = start;
  }

  /** @throws Error where the past would run backwards */
  moveTo(moment: Date): void {
    if (moment < this.now) throw new Error('the demo plays its events in order');
    this.now = moment;
  }
}

export type Account = { id: string; uid: string; name: string; email: string };

export class DemoWorld {
  readonly deps: DemoDeps;
  readonly clock: DemoClock;

  constructor(deps: DemoDeps, clock: DemoClock) {
    this.deps = deps;
    this.clock = clock;
  }

  account(
    person: { email: string; name: string; password: string },
    administrator = false,
  ): Promise<Account> {
    return inTransaction(this.deps.databases.masked, null, async (tx) => {
      const { id, uid } = await accountWithPassword(tx, this.clock.now, person, administrator);
      return { id, uid, name: person.name, email: person.email };
    });
  }

  async study(setup: SetupFileInput, owner: Account): Promise<DemoStudy> {
    const file = setupFileSchema.parse(setup);
    const study = await inTransaction(this.deps.databases.masked, null, (tx) =>
      foundStudy(tx, this.clock.now, file, owner),
    );
    return new DemoStudy(this, { id: study.id, uid: study.uid }, owner);
  }
}

export class DemoStudy {
  readonly world: DemoWorld;
  readonly id: string;
  readonly uid: string;
  private readonly owner: Account;

  constructor(world: DemoWorld, study: { id: string; uid: string }, owner: Account) {
    this.world = world;
    this.id = study.id;
    this.uid = study.uid;
    this.owner = owner;
  }

  actor(account: Account, role: StudyRole): Actor {
    return {
      accountId: account.id,
      accountUid: account.uid,
      name: account.name,
      role,
      sessionUid: null,
      requestId: null,
    };
  }

  async membership(account: Account): Promise<StudyMembership> {
    const held = await membershipOf(this.world.deps.databases.masked, account.id, this.uid);
    if (!held) throw new Error(`${account.name} is no member`);
    return held;
  }

  /** @param sites codes; for a coordinator */
  async add(
    account: Account,
    roles: StudyRole[],
    sites: string[] = [],
    chair = false,
  ): Promise<void> {
    const { databases } = this.world.deps;
    const rows: { uid: string }[] = await databases.masked.query(
      'SELECT uid FROM site WHERE study_id = $1 AND code = ANY($2::text[])',
      [this.id, sites],
    );
    await addMember(
      {
        deps: { databases, clock: () => this.world.clock.now },
        actor: this.actor(this.owner, 'owner'),
        membership: await this.membership(this.owner),
      },
      { email: account.email, roles, chair, siteIds: rows.map((row) => row.uid) },
    );
  }

  /** One act on subjects, in its own transaction with its audit entries. */
  async act<T>(
    account: Account,
    role: 'coordinator' | 'unblinded statistician' | 'owner',
    work: (act: StudyAct) => Promise<T>,
  ): Promise<T> {
    const { databases } = this.world.deps;
    const { siteIds } = await this.membership(account);
    return actInStudy(
      {
        db: role === 'unblinded statistician' ? databases.open : databases.masked,
        actor: this.actor(account, role),
        clock: () => this.world.clock.now,
        studyUid: this.uid,
        siteIds: role === 'coordinator' ? siteIds : null,
      },
      work,
    );
  }

  scope(analyst: Account): StudyScope {
    const { deps, clock } = this.world;
    return {
      db: deps.databases.masked,
      actor: this.actor(analyst, 'analyst'),
      studyId: this.id,
      studyUid: this.uid,
      clock: () => clock.now,
      threads: deps.threads,
    };
  }
}
