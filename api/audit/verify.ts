/** Walks every audit chain from its first entry and finds the first link that does not hold. */
import { createHash } from 'node:crypto';
import type { DataSource } from 'typeorm';
import type { ObjectStore } from '../storage/object-store.ts';
import { readAnchors } from './anchors.ts';
import { orderedJson } from './entry-body.ts';

export type BrokenLinkCode =
  | 'entry missing'
  | 'previous hash differs'
  | 'hash differs'
  | 'columns differ'
  | 'head differs'
  | 'anchor differs'
  | 'anchored entry missing';

export interface BrokenLink {
  chain: string;
  /** Number of the entry that is wrong or missing. */
  seq: number;
  code: BrokenLinkCode;
}

export interface AuditVerification {
  chains: number;
  entries: number;
  anchors: number;
  /** The first broken link of each chain that has one. */
  broken: BrokenLink[];
}

interface EntryRow {
  seq: string;
  at: Date;
  account_id: string | null;
  actor_name: string | null;
  role_then: string | null;
  session_uid: string | null;
  request_id: string | null;
  action: string;
  entity: string;
  entity_uid: string | null;
  before: unknown;
  after: unknown;
  reason: string | null;
  body: string;
  previous_hash: string;
  hash: string;
}

const PAGE = 2_000;
const BEFORE_THE_FIRST = '0'.repeat(64);

/** @param store also compares with the heads written there; left out, only the database is checked */
export async function verifyChains(
  db: DataSource,
  store?: ObjectStore,
): Promise<AuditVerification> {
  const heads: { name: string; head_seq: string; head_hash: string }[] = await db.query(
    'SELECT name, head_seq, head_hash FROM audit.chain ORDER BY name',
  );
  const anchors = store ? await readAnchors(store) : [];
  const anchored = new Map<string, Map<number, string>>();
  for (const head of anchors.flatMap((anchor) => anchor.heads)) {
    const ofChain = anchored.get(head.chain) ?? new Map<number, string>();
    ofChain.set(head.seq, head.hash);
    anchored.set(head.chain, ofChain);
  }

  const broken: BrokenLink[] = [];
  let entries = 0;
  for (const head of heads) {
    const expected = anchored.get(head.name) ?? new Map<number, string>();
    anchored.delete(head.name);
    const walk = await walkChain(db, head, expected);
    entries += walk.entries;
    if (walk.broken) {
      broken.push(walk.broken);
    }
  }
  // A chain that was anchored and is gone altogether.
  for (const chain of anchored.keys()) {
    broken.push({ chain, seq: 1, code: 'anchored entry missing' });
  }
  return { chains: heads.length, entries, anchors: anchors.length, broken };
}

async function walkChain(
  db: DataSource,
  head: { name: string; head_seq: string; head_hash: string },
  anchored: Map<number, string>,
): Promise<{ entries: number; broken: BrokenLink | null }> {
  const chain = head.name;
  const headSeq = Number(head.head_seq);
  let seq = 0;
  let hash = BEFORE_THE_FIRST;
  for (;;) {
    // Up to the head read at the start: writers may go on meanwhile.
    const rows: EntryRow[] = await db.query(
      `SELECT seq, at, account_id, actor_name, role_then, session_uid, request_id, action, entity,
              entity_uid, before, after, reason, body, previous_hash, hash
         FROM audit.entry WHERE chain = $1 AND seq > $2 AND seq <= $3 ORDER BY seq LIMIT ${PAGE}`,
      [chain, seq, headSeq],
    );
    for (const row of rows) {
      const code = judgeEntry(row, chain, seq, hash, anchored);
      if (code) {
        return { entries: seq, broken: { chain, seq: seq + 1, code } };
      }
      seq += 1;
      hash = row.hash;
    }
    if (rows.length < PAGE) {
      break;
    }
  }
  if (seq < headSeq) {
    return { entries: seq, broken: { chain, seq: seq + 1, code: 'entry missing' } };
  }
  if (hash !== head.head_hash) {
    return { entries: seq, broken: { chain, seq, code: 'head differs' } };
  }
  // Tail and head cut off together are told by what was written elsewhere.
  const lastAnchored = Math.max(0, ...anchored.keys());
  return lastAnchored > seq
    ? { entries: seq, broken: { chain, seq: seq + 1, code: 'anchored entry missing' } }
    : { entries: seq, broken: null };
}

function judgeEntry(
  row: EntryRow,
  chain: string,
  lastSeq: number,
  lastHash: string,
  anchored: Map<number, string>,
): BrokenLinkCode | null {
  const seq = lastSeq + 1;
  if (Number(row.seq) !== seq) {
    return 'entry missing';
  }
  if (row.previous_hash !== lastHash) {
    return 'previous hash differs';
  }
  const text = `${lastHash}\n${chain}\n${seq}\n${row.body}`;
  if (row.hash !== createHash('sha256').update(text, 'utf8').digest('hex')) {
    return 'hash differs';
  }
  if (!columnsAgree(row)) {
    return 'columns differ';
  }
  const anchor = anchored.get(seq);
  return anchor !== undefined && anchor !== row.hash ? 'anchor differs' : null;
}

/** The columns are for searching; the body is what is hashed. One changed without the other is a forgery. */
function columnsAgree(row: EntryRow): boolean {
  const body = JSON.parse(row.body) as Record<string, unknown>;
  const columns: Record<string, unknown> = {
    at: row.at.toISOString(),
    accountId: row.account_id,
    actorName: row.actor_name,
    role: row.role_then,
    sessionUid: row.session_uid,
    requestId: row.request_id,
    action: row.action,
    entity: row.entity,
    entityUid: row.entity_uid,
    before: row.before,
    after: row.after,
    reason: row.reason,
  };
  return Object.entries(columns).every(
    ([key, value]) => orderedJson(value ?? null) === orderedJson(body[key] ?? null),
  );
}
