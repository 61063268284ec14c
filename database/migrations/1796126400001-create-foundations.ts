import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Keys that grow with time, the guard of rows that never change, accounts, sessions, counters, outbox. */
export class CreateFoundations1796126400001 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    // UUID v7 by hand, since PostgreSQL 15 has none: 48 bits of milliseconds over a random v4, version bits 0111.
    await runner.query(`
      CREATE FUNCTION public.uuid_v7() RETURNS uuid LANGUAGE sql VOLATILE PARALLEL SAFE AS $$
        SELECT encode(
          set_bit(set_bit(overlay(uuid_send(gen_random_uuid())
            PLACING substring(int8send((extract(epoch FROM clock_timestamp()) * 1000)::bigint) FROM 3)
            FROM 1 FOR 6), 52, 1), 53, 1), 'hex')::uuid
      $$`);
    await runner.query(`
      CREATE FUNCTION public.refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
      BEGIN
        RAISE EXCEPTION 'rows of %.% never change', TG_TABLE_SCHEMA, TG_TABLE_NAME USING ERRCODE = '55000';
      END $$`);

    await runner.query(`
      CREATE TABLE account (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        email text NOT NULL CHECK (email LIKE '_%@_%' AND length(email) <= 254),
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 120),
        password_hash text NOT NULL,
        administrator boolean NOT NULL DEFAULT false,
        must_change_password boolean NOT NULL DEFAULT false,
        disabled_at timestamptz,
        theme text NOT NULL DEFAULT 'system' CHECK (theme IN ('system', 'light', 'dark')),
        time_zone text NOT NULL DEFAULT 'UTC',
        created_at timestamptz NOT NULL,
        version integer NOT NULL DEFAULT 1
      )`);
    await runner.query('CREATE UNIQUE INDEX account_email ON account (lower(email))');

    await runner.query(`
      CREATE TABLE session (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        account_id bigint NOT NULL REFERENCES account,
        created_at timestamptz NOT NULL,
        last_seen_at timestamptz NOT NULL,
        absolute_expires_at timestamptz NOT NULL,
        revoked_at timestamptz,
        revoked_reason text,
        address_hash text,
        agent text
      )`);
    await runner.query('CREATE INDEX session_account ON session (account_id, id)');
    await runner.query(`
      CREATE TABLE refresh_token (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        session_id bigint NOT NULL REFERENCES session ON DELETE CASCADE,
        token_hash text NOT NULL UNIQUE,
        issued_at timestamptz NOT NULL,
        used_at timestamptz,
        expires_at timestamptz NOT NULL
      )`);
    await runner.query('CREATE INDEX refresh_token_session ON refresh_token (session_id)');
    await runner.query(`
      CREATE TABLE rate_counter (
        key text NOT NULL,
        window_start timestamptz NOT NULL,
        count integer NOT NULL DEFAULT 0,
        PRIMARY KEY (key, window_start)
      )`);
    await runner.query(`
      CREATE TABLE idempotency (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        account_id bigint NOT NULL REFERENCES account,
        key text NOT NULL,
        route text NOT NULL,
        request_hash text NOT NULL,
        status integer,
        body text,
        created_at timestamptz NOT NULL,
        UNIQUE (account_id, key, route)
      )`);
    await runner.query('CREATE INDEX idempotency_created ON idempotency (created_at)');
    // The outbox keeps recipient, kind and state of a letter; never its text or a link.
    await runner.query(`
      CREATE TABLE letter (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        to_account bigint NOT NULL REFERENCES account,
        kind text NOT NULL,
        state text NOT NULL CHECK (state IN ('waiting', 'sent', 'failed')),
        created_at timestamptz NOT NULL,
        sent_at timestamptz
      )`);
    await runner.query('CREATE INDEX letter_account ON letter (to_account)');
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of [
      'letter',
      'idempotency',
      'rate_counter',
      'refresh_token',
      'session',
      'account',
    ]) {
      await runner.query(`DROP TABLE ${table}`);
    }
    await runner.query('DROP FUNCTION refuse_change()');
    await runner.query('DROP FUNCTION uuid_v7()');
  }
}
