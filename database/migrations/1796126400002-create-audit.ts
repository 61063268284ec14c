import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * The audit trail: one hash chain per study and one of the installation.
 *
 * Nobody holds the right to write here. `audit.append` runs as the owner, locks the head of its chain
 * until the transaction ends, and so gives every entry the next number without a gap: a transaction that
 * rolls back takes its number with it.
 */
export class CreateAudit1796126400002 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query('CREATE SCHEMA audit');
    await runner.query(`
      CREATE TABLE audit.chain (
        name text PRIMARY KEY,
        head_seq bigint NOT NULL,
        head_hash text NOT NULL CHECK (head_hash ~ '^[0-9a-f]{64}$')
      )`);
    await runner.query(`
      CREATE TABLE audit.entry (
        chain text NOT NULL REFERENCES audit.chain,
        seq bigint NOT NULL CHECK (seq > 0),
        at timestamptz NOT NULL,
        account_id bigint REFERENCES account,
        actor_name text,
        role_then text,
        session_uid uuid,
        request_id text,
        action text NOT NULL,
        entity text NOT NULL,
        entity_uid uuid,
        before jsonb,
        after jsonb,
        reason text,
        body text NOT NULL,
        previous_hash text NOT NULL,
        hash text NOT NULL,
        PRIMARY KEY (chain, seq)
      )`);
    await runner.query('CREATE INDEX audit_entry_action ON audit.entry (chain, action, seq)');
    await runner.query('CREATE INDEX audit_entry_account ON audit.entry (chain, account_id, seq)');
    await runner.query('CREATE INDEX audit_entry_entity ON audit.entry (entity_uid, seq)');

    // The body is hashed as the text that came in: no second writer of JSON can change a byte of it.
    await runner.query(`
      CREATE FUNCTION audit.append(chain_name text, body text) RETURNS bigint
      LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, pg_temp AS $$
      DECLARE
        head audit.chain;
        entry jsonb := body::jsonb;
        next_seq bigint;
        next_hash text;
      BEGIN
        IF current_setting('transaction_isolation') <> 'read committed' THEN
          RAISE EXCEPTION 'audit entries are appended under READ COMMITTED only' USING ERRCODE = '25001';
        END IF;
        INSERT INTO audit.chain (name, head_seq, head_hash)
          VALUES (chain_name, 0, repeat('0', 64)) ON CONFLICT (name) DO NOTHING;
        SELECT * INTO head FROM audit.chain WHERE name = chain_name FOR UPDATE;
        next_seq := head.head_seq + 1;
        next_hash := encode(sha256(convert_to(
          head.head_hash || E'\\n' || chain_name || E'\\n' || next_seq || E'\\n' || body, 'UTF8')), 'hex');
        INSERT INTO audit.entry (chain, seq, at, account_id, actor_name, role_then, session_uid,
            request_id, action, entity, entity_uid, before, after, reason, body, previous_hash, hash)
          VALUES (chain_name, next_seq, (entry->>'at')::timestamptz, (entry->>'accountId')::bigint,
            entry->>'actorName', entry->>'role', (entry->>'sessionUid')::uuid, entry->>'requestId',
            entry->>'action', entry->>'entity', (entry->>'entityUid')::uuid,
            nullif(entry->'before', 'null'::jsonb), nullif(entry->'after', 'null'::jsonb),
            entry->>'reason', body, head.head_hash, next_hash);
        UPDATE audit.chain SET head_seq = next_seq, head_hash = next_hash WHERE name = chain_name;
        RETURN next_seq;
      END $$`);
    await runner.query('REVOKE ALL ON FUNCTION audit.append(text, text) FROM PUBLIC');

    await runner.query(`
      CREATE TRIGGER entry_never_changes BEFORE UPDATE OR DELETE ON audit.entry
        FOR EACH ROW EXECUTE FUNCTION public.refuse_change()`);
    await runner.query(`
      CREATE TRIGGER entry_never_emptied BEFORE TRUNCATE ON audit.entry
        FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change()`);
    await runner.query(`
      CREATE FUNCTION audit.head_moves_by_one() RETURNS trigger LANGUAGE plpgsql AS $$
      BEGIN
        IF NEW.name <> OLD.name OR NEW.head_seq <> OLD.head_seq + 1 THEN
          RAISE EXCEPTION 'the head of an audit chain moves by one entry' USING ERRCODE = '55000';
        END IF;
        RETURN NEW;
      END $$`);
    await runner.query(`
      CREATE TRIGGER chain_head_moves_by_one BEFORE UPDATE ON audit.chain
        FOR EACH ROW EXECUTE FUNCTION audit.head_moves_by_one()`);
    await runner.query(`
      CREATE TRIGGER chain_never_deleted BEFORE DELETE ON audit.chain
        FOR EACH ROW EXECUTE FUNCTION public.refuse_change()`);
    await runner.query(`
      CREATE TRIGGER chain_never_emptied BEFORE TRUNCATE ON audit.chain
        FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change()`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP SCHEMA audit CASCADE');
  }
}
