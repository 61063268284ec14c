import type { MigrationInterface, QueryRunner } from 'typeorm';

const NEVER_CHANGED = ['cut', 'cut_chunk', 'acknowledgement', 'analysis_record', 'signature'];

/** Cuts, what was looked at on them, and the records that stay. */
export class CreateAnalysis1796126400005 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE cut (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        number integer NOT NULL CHECK (number > 0),
        name text NOT NULL,
        measures jsonb NOT NULL,
        visit_cutoff date NOT NULL,
        entered_until timestamptz NOT NULL,
        frozen_by bigint NOT NULL REFERENCES account,
        frozen_at timestamptz NOT NULL,
        exclusions jsonb NOT NULL,
        withdrawn_included_reason text,
        withdrawn_left_out jsonb NOT NULL,
        row_count integer NOT NULL,
        subject_count integer NOT NULL,
        reading_count integer NOT NULL,
        late_count integer NOT NULL,
        pending_count integer NOT NULL,
        open_queries integer NOT NULL DEFAULT 0,
        late_rows jsonb NOT NULL,
        pending_rows jsonb NOT NULL,
        ended jsonb NOT NULL,
        groups jsonb NOT NULL,
        sha256 text NOT NULL CHECK (sha256 ~ '^[0-9a-f]{64}$'),
        previous_cut_id bigint REFERENCES cut,
        difference jsonb,
        UNIQUE (study_id, number)
      )`);
    await runner.query(`
      CREATE TABLE cut_chunk (
        cut_id bigint NOT NULL REFERENCES cut,
        seq integer NOT NULL,
        bytes bytea NOT NULL,
        PRIMARY KEY (cut_id, seq)
      )`);
    await runner.query(`
      CREATE TABLE specification (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        cut_id bigint NOT NULL REFERENCES cut,
        measure text NOT NULL,
        axis text NOT NULL CHECK (axis IN ('since_baseline', 'planned_day')),
        unit text NOT NULL CHECK (unit IN ('days', 'weeks')),
        group_by boolean NOT NULL,
        sha256 text NOT NULL,
        number integer NOT NULL CHECK (number > 0),
        created_at timestamptz NOT NULL,
        UNIQUE (cut_id, sha256),
        UNIQUE (cut_id, measure, number)
      )`);
    await runner.query(`
      CREATE TABLE check_opening (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        specification_id bigint NOT NULL REFERENCES specification,
        account_id bigint NOT NULL REFERENCES account,
        at timestamptz NOT NULL,
        seed bigint NOT NULL,
        result text
      )`);
    await runner.query(
      'CREATE INDEX check_opening_person ON check_opening (specification_id, account_id, id)',
    );
    await runner.query(`
      CREATE TABLE acknowledgement (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        specification_id bigint NOT NULL REFERENCES specification,
        account_id bigint NOT NULL REFERENCES account,
        reason text NOT NULL CHECK (length(btrim(reason)) >= 20),
        at timestamptz NOT NULL
      )`);
    await runner.query(
      'CREATE INDEX acknowledgement_person ON acknowledgement (specification_id, account_id, id)',
    );
    await runner.query(`
      CREATE TABLE analysis_record (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        cut_id bigint NOT NULL REFERENCES cut,
        specification_id bigint NOT NULL REFERENCES specification,
        fit text NOT NULL CHECK (fit IN ('pooled', 'ordinary')),
        purpose text NOT NULL CHECK (purpose IN ('planned', 'exploratory')),
        acknowledgement_id bigint REFERENCES acknowledgement,
        check_text text NOT NULL,
        result_text text NOT NULL,
        picture_text text,
        headline jsonb,
        stamp text,
        content_sha256 text NOT NULL CHECK (content_sha256 ~ '^[0-9a-f]{64}$'),
        engine_version text NOT NULL,
        seed bigint NOT NULL,
        created_by bigint NOT NULL REFERENCES account,
        created_at timestamptz NOT NULL
      )`);
    await runner.query('CREATE INDEX analysis_record_study ON analysis_record (study_id, id)');
    await runner.query('CREATE INDEX analysis_record_cut ON analysis_record (cut_id, id)');
    await runner.query(`
      CREATE TABLE signature (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        entity_kind text NOT NULL,
        entity_uid uuid NOT NULL,
        account_id bigint NOT NULL REFERENCES account,
        signed_name text NOT NULL,
        signed_at timestamptz NOT NULL,
        zone text NOT NULL,
        meaning text NOT NULL,
        content_sha256 text NOT NULL
      )`);
    await runner.query('CREATE INDEX signature_entity ON signature (entity_kind, entity_uid, id)');

    for (const table of NEVER_CHANGED) {
      await runner.query(`
        CREATE TRIGGER ${table}_never_changes BEFORE UPDATE OR DELETE ON ${table}
          FOR EACH ROW EXECUTE FUNCTION refuse_change()`);
      await runner.query(`
        CREATE TRIGGER ${table}_never_emptied BEFORE TRUNCATE ON ${table}
          FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()`);
    }
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of [
      'signature',
      'analysis_record',
      'acknowledgement',
      'check_opening',
      'specification',
      'cut_chunk',
      'cut',
    ]) {
      await runner.query(`DROP TABLE ${table}`);
    }
  }
}
