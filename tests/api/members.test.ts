import type TestAgent from 'supertest/lib/agent.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeWorld, type World } from './matrix/world.ts';
import { PASSWORD, type TestPerson } from './people.ts';

let world: World;
let owner: TestAgent;
let members: string;
let elm: string;
let fir: string;

beforeAll(async () => {
  world = await makeWorld();
  owner = await world.agent('owner');
  members = `/api/studies/${world.study.uid}/members`;
  const sites = await world.query<{ uid: string }>(
    'SELECT uid FROM site WHERE study_id = $1 ORDER BY code',
    [world.study.id],
  );
  elm = sites[0]?.uid ?? '';
  fir = sites[1]?.uid ?? '';
});
afterAll(() => world.close());

const duties = { chair: false, siteIds: [] as string[] };
const add = (person: Pick<TestPerson, 'email'>, roles: string[], more: object = {}) =>
  owner.post(members).send({ email: person.email, roles, ...duties, ...more });
const stored = () =>
  world.query('SELECT account_id, role, chair, removed_at, version FROM membership ORDER BY id');

describe('adding a person', () => {
  it('gives the places of the union of their duties, and writes who may what into the trail', async () => {
    const person = await world.newPerson();
    const made = await add(person, ['coordinator', 'analyst'], { siteIds: [elm] });
    expect(made.status).toBe(201);
    expect(made.body).toMatchObject({
      id: person.uid,
      roles: ['coordinator', 'analyst'],
      sites: [{ code: 'elm' }],
      version: 2,
    });
    const agent = await world.app.signedIn(person.email, PASSWORD);
    const me = await agent.get('/api/me').expect(200);
    expect(me.body.memberships).toMatchObject([
      {
        study: { id: world.study.uid, masked: true },
        roles: ['coordinator', 'analyst'],
        places: ['subjects', 'import', 'cuts', 'check', 'records'],
        sites: [{ code: 'elm' }],
      },
    ]);
    const [entry] = await world.query(
      `SELECT role_then, before, after FROM audit.entry WHERE chain = $1 AND action = 'member added' AND entity_uid = $2`,
      [world.study.uid, person.uid],
    );
    expect(entry).toEqual({
      role_then: 'owner',
      before: null,
      after: {
        account: person.uid,
        roles: ['coordinator', 'analyst'],
        chair: false,
        sites: ['elm'],
      },
    });
  });

  it('is refused in words where there is no account, a closed one, a member or an administrator', async () => {
    const before = await stored();
    const closed = await world.newPerson();
    await world.query('UPDATE account SET disabled_at = now() WHERE id = $1', [closed.id]);
    const tries: [Pick<TestPerson, 'email'>, number, string][] = [
      [{ email: 'nobody@nowhere.example' }, 422, 'member_no_account'],
      [closed, 422, 'member_no_account'],
      [world.people.monitor, 409, 'member_already'],
      [world.people.administrator, 422, 'member_administrator'],
    ];
    for (const [person, status, code] of tries) {
      const answer = await add(person, ['analyst']);
      expect([answer.status, answer.body.code]).toEqual([status, code]);
      expect(answer.body.errors[0].path).toBe('email');
      expect(answer.body.errors[0].message).toBe(answer.body.detail);
    }
    expect(await stored()).toEqual(before);
  });

  it('refuses duties that exclude each other, with both names and the reason', async () => {
    const person = await world.newPerson();
    const before = await stored();
    const others = ['owner', 'coordinator', 'monitor', 'analyst', 'safety officer'];
    for (const alone of ['unblinded statistician', 'board member']) {
      for (const other of [
        ...others,
        alone === 'board member' ? 'unblinded statistician' : 'board member',
      ]) {
        const siteIds = other === 'coordinator' ? [elm] : [];
        const answer = await add(person, [other, alone], { siteIds });
        expect([answer.status, answer.body.code]).toEqual([422, 'duties_exclude']);
        expect(answer.body.detail).toContain(alone);
        expect(answer.body.detail).toContain(other);
        expect(answer.body.detail).not.toContain('{');
      }
    }
    expect(await stored()).toEqual(before);
  });

  it('asks for sites of a coordinator, of this study, and for a chair who is on the board', async () => {
    const person = await world.newPerson();
    const [foreign] = await world.query<{ uid: string }>(
      'SELECT uid FROM site WHERE study_id = $1 LIMIT 1',
      [world.otherStudy.id],
    );
    const said = async (roles: string[], more: object) =>
      (await add(person, roles, more)).body.code;
    expect(await said(['coordinator'], {})).toBe('coordinator_needs_site');
    expect(await said(['analyst'], { siteIds: [elm] })).toBe('sites_without_coordinator');
    expect(await said(['coordinator'], { siteIds: [elm, foreign?.uid] })).toBe('site_unknown');
    expect(await said(['analyst'], { chair: true })).toBe('chair_needs_board');
    const chair = await add(person, ['board member'], { chair: true });
    expect([chair.status, chair.body.chair]).toEqual([201, true]);
  });
});

describe('changing duties', () => {
  it('keeps what stays, marks what goes, and refuses what was read too long ago', async () => {
    const person = await world.newPerson();
    const made = await add(person, ['coordinator'], { siteIds: [elm] });
    const change = (version: number, roles: string[], siteIds: string[]) =>
      owner.patch(`${members}/${person.uid}`).send({ roles, chair: false, siteIds, version });
    const moved = await change(made.body.version, ['coordinator', 'monitor'], [fir]);
    expect(moved.body).toMatchObject({
      roles: ['coordinator', 'monitor'],
      sites: [{ code: 'fir' }],
      version: 3,
    });
    const stale = await change(made.body.version, ['monitor'], []);
    expect([stale.status, stale.body.code]).toEqual([409, 'stale_version']);
    expect(stale.body.params).toEqual({ given: 1, held: 3 });
    // From one side of a wall to the other in one step.
    const walled = await change(3, ['unblinded statistician'], []);
    expect(walled.body.roles).toEqual(['unblinded statistician']);
    const rows = await world.query(
      'SELECT role, removed_at IS NOT NULL AS removed FROM membership WHERE account_id = $1 ORDER BY role',
      [person.id],
    );
    expect(rows).toEqual([
      { role: 'coordinator', removed: true },
      { role: 'monitor', removed: true },
      { role: 'unblinded statistician', removed: false },
    ]);
  });

  it('takes effect at the next request, though the session goes on', async () => {
    const person = await world.newPerson();
    const made = await add(person, ['owner']);
    const agent = await world.app.signedIn(person.email, PASSWORD);
    await agent.get(members).expect(200);
    await owner
      .patch(`${members}/${person.uid}`)
      .send({ roles: ['monitor'], ...duties, version: made.body.version })
      .expect(200);
    const refused = await agent.get(members);
    expect([refused.status, refused.body.code]).toEqual([403, 'role_refused']);
    expect(refused.body.params).toEqual({ roles: 'owner' });
  });
});

describe('removing a person', () => {
  it('closes the study to them and keeps their rows', async () => {
    const person = await world.newPerson();
    await add(person, ['monitor']);
    const agent = await world.app.signedIn(person.email, PASSWORD);
    await agent.get(`/api/studies/${world.study.uid}`).expect(200);
    await owner
      .post(`${members}/${person.uid}/remove`)
      .send({ version: 1, reason: 'left the team' })
      .expect(204);
    await agent.get(`/api/studies/${world.study.uid}`).expect(404);
    expect((await agent.get('/api/me')).body.memberships).toEqual([]);
    const [row] = await world.query<{ removed_at: Date }>(
      'SELECT removed_at FROM membership WHERE account_id = $1',
      [person.id],
    );
    expect(row?.removed_at).toEqual(world.app.clock.now);
    const back = await add(person, ['analyst']);
    expect([back.status, back.body.version]).toEqual([201, 3]);
  });

  it('keeps the last owner, not counting one who can not sign in, also when two leave at once', async () => {
    const [own] = (await owner.get(`${members}?role=owner`)).body.rows;
    const path = `${members}/${world.people.owner.uid}`;
    const leave = (agent: TestAgent, uid: string, version: number) =>
      agent.post(`${members}/${uid}/remove`).send({ version, reason: 'left the team' });
    const last = await leave(owner, world.people.owner.uid, own.version);
    expect([last.status, last.body.code]).toEqual([409, 'member_last_owner']);
    const given = await owner
      .patch(path)
      .send({ roles: ['monitor'], ...duties, version: own.version });
    expect(given.body.code).toBe('member_last_owner');

    const second = await world.newPerson();
    await add(second, ['owner']);
    await world.query('UPDATE account SET disabled_at = now() WHERE id = $1', [second.id]);
    expect((await leave(owner, world.people.owner.uid, own.version)).body.code).toBe(
      'member_last_owner',
    );
    await world.query('UPDATE account SET disabled_at = NULL WHERE id = $1', [second.id]);

    const other = await world.app.signedIn(second.email, PASSWORD);
    const answers = await Promise.all([
      leave(owner, second.uid, 1),
      leave(other, world.people.owner.uid, own.version),
    ]);
    expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
    const left = await world.query(
      `SELECT 1 FROM membership WHERE study_id = $1 AND role = 'owner' AND removed_at IS NULL`,
      [world.study.id],
    );
    expect(left).toHaveLength(1);
  });
});

describe('the list', () => {
  it('holds one row a person, sorted and filtered, and the sites for the form', async () => {
    const monitor = await world.agent('stranger');
    const path = `/api/studies/${world.otherStudy.uid}/members`;
    const list = await monitor.get(path).expect(200);
    expect(list.body).toMatchObject({
      total: 1,
      rows: [
        {
          name: 'The stranger',
          roles: ['owner', 'coordinator', 'monitor', 'analyst', 'safety officer'],
        },
      ],
      sites: [{ code: 'elm' }, { code: 'fir' }],
    });
    expect((await monitor.get(`${path}?role=board%20member`)).body.total).toBe(0);
    expect((await monitor.get(`${path}?text=STRANG`)).body.total).toBe(1);
  });
});
