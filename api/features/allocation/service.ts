/**
 * The only reader and writer of the schema `sealed`. Needs the open database role: with any other the
 * sealed entities are unknown to the data source, and PostgreSQL itself refuses.
 *
 * Nothing said from here, to the trail or in an error, pairs a subject with an arm or a code.
 */
import { randomInt, randomUUID } from 'node:crypto';
import { Arm, OpenArm, Subject } from '../../../database/entities/index.ts';
import { CodeKey, SealedAllocation } from '../../../database/entities/sealed/index.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyAct } from '../subjects/study-act.ts';

export interface AllocationRow {
  subjectCode: string;
  armName: string;
}

interface Placed {
  subjectId: string;
  armId: string;
}

const ROWS_PER_INSERT = 1_000;

/**
 * Enters a list of who is in which arm: sealed in a masked study, open otherwise. All or nothing.
 *
 * A sealed list is written in shuffled order under random keys and one time, so that neither the order nor
 * the times of its rows tell how subjects were allocated.
 *
 * @returns how many rows were entered
 * @throws Problem `allocation_not_here` for anyone but the unblinded statistician in a masked study,
 * `allocation_row_unknown` or `allocation_twice` with the number of the row
 */
export async function enterAllocation(
  act: StudyAct,
  rows: readonly AllocationRow[],
): Promise<number> {
  if (act.study.masked && act.tx.actor?.role !== 'unblinded statistician') {
    throw new Problem('allocation_not_here');
  }
  const placed = await placeRows(act, rows);
  if (act.study.masked) {
    await seal(act, placed);
  } else {
    await insertInParts(placed, async (part) => {
      await act.tx.manager
        .getRepository(OpenArm)
        .insert(part.map((row) => ({ studyId: act.study.id, ...row })));
    });
  }
  act.tx.audit({
    at: act.now,
    studyUid: act.study.uid,
    action: act.study.masked ? 'sealed allocation entered' : 'open allocation entered',
    entity: act.study.masked ? 'sealed.allocation' : 'open_arm',
    entityUid: null,
    after: { rows: placed.length },
  });
  return placed.length;
}

async function placeRows(act: StudyAct, rows: readonly AllocationRow[]): Promise<Placed[]> {
  const { manager } = act.tx;
  const studyId = act.study.id;
  const subjects = await manager
    .getRepository(Subject)
    .find({ where: { studyId }, select: { id: true, code: true } });
  const arms = await manager.getRepository(Arm).findBy({ studyId });
  const subjectIds = new Map(subjects.map((subject) => [subject.code, subject.id]));
  const armIds = new Map(arms.map((arm) => [arm.name, arm.id]));
  const taken = new Set(await alreadyListed(act));
  return rows.map((row, index) => {
    const subjectId = subjectIds.get(row.subjectCode);
    const armId = armIds.get(row.armName);
    if (subjectId === undefined || armId === undefined) {
      throw new Problem('allocation_row_unknown', { row: index + 1 });
    }
    if (taken.has(subjectId)) {
      throw new Problem('allocation_twice', { row: index + 1 });
    }
    taken.add(subjectId);
    return { subjectId, armId };
  });
}

async function alreadyListed(act: StudyAct): Promise<string[]> {
  const { manager } = act.tx;
  const where = { studyId: act.study.id };
  const held = act.study.masked
    ? await manager.getRepository(SealedAllocation).findBy(where)
    : await manager.getRepository(OpenArm).findBy(where);
  return held.map((row) => row.subjectId);
}

async function seal(act: StudyAct, placed: readonly Placed[]): Promise<void> {
  const { manager } = act.tx;
  const shuffled = shuffle(placed);
  await insertInParts(shuffled, async (part) => {
    await manager.getRepository(SealedAllocation).insert(
      part.map((row) => ({
        id: randomUUID(),
        studyId: act.study.id,
        listedAt: act.now,
        ...row,
      })),
    );
  });
  await drawKeyOnce(act);
}

/** Codes are drawn once per study and then stay the same in every packet. */
async function drawKeyOnce(act: StudyAct): Promise<void> {
  const { manager } = act.tx;
  const studyId = act.study.id;
  if (await manager.getRepository(CodeKey).existsBy({ studyId })) {
    return;
  }
  const arms = await manager.getRepository(Arm).findBy({ studyId });
  const codes = shuffle(drawCodes(arms.length));
  const rows = shuffle(arms).map((arm, index) => ({
    id: randomUUID(),
    studyId,
    armId: arm.id,
    code: codes[index] as string,
    drawnAt: act.now,
  }));
  await manager.getRepository(CodeKey).insert(rows);
  act.tx.audit({
    at: act.now,
    studyUid: act.study.uid,
    action: 'codes drawn',
    entity: 'sealed.code_key',
    entityUid: null,
    after: { codes: rows.length },
  });
}

/** Without vowels and look-alikes, so that no code is a word and none is misread for another. */
const LETTERS = 'CDFGHJKMNPRTVWX';

function drawCodes(count: number): string[] {
  const codes = new Set<string>();
  while (codes.size < count) {
    codes.add(`${LETTERS[randomInt(LETTERS.length)]}${LETTERS[randomInt(LETTERS.length)]}`);
  }
  return [...codes];
}

/** Fisher and Yates's shuffle, on random numbers of the operating system: a seed could be found out. */
function shuffle<T>(values: readonly T[]): T[] {
  const dealt = [...values];
  for (let last = dealt.length - 1; last > 0; last -= 1) {
    const pick = randomInt(last + 1);
    [dealt[last], dealt[pick]] = [dealt[pick] as T, dealt[last] as T];
  }
  return dealt;
}

async function insertInParts<T>(
  rows: readonly T[],
  insert: (part: T[]) => Promise<void>,
): Promise<void> {
  for (let from = 0; from < rows.length; from += ROWS_PER_INSERT) {
    await insert(rows.slice(from, from + ROWS_PER_INSERT));
  }
}
