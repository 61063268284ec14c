import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * Subjects, visits, readings and the imports they come from.
 *
 * Foreign keys carry the study (or the subject) along, so that a row can't point into another study.
 */
export class CreateFollowUp1796126400004 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE subject (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        site_id bigint NOT NULL,
        code text NOT NULL CHECK (code ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,31}$'),
        consent_version text,
        consent_date date,
        enrolment_date date,
        baseline_date date,
        state text NOT NULL CHECK (state IN ('screening', 'screen failed', 'enrolled', 'completed',
          'stopped the intervention but followed', 'withdrawn from visits', 'consent withdrawn',
          'lost to follow-up', 'died')),
        state_date date,
        state_reason text,
        created_at timestamptz NOT NULL,
        created_by bigint NOT NULL REFERENCES account,
        version integer NOT NULL DEFAULT 1,
        UNIQUE (study_id, code),
        UNIQUE (study_id, id),
        FOREIGN KEY (study_id, site_id) REFERENCES site (study_id, id),
        CHECK (state IN ('screening', 'screen failed') OR (consent_date IS NOT NULL AND consent_version IS NOT NULL)),
        CHECK (baseline_date >= consent_date)
      )`);
    await runner.query('CREATE INDEX subject_site ON subject (site_id, id)');

    await runner.query(`
      CREATE TABLE import (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        account_id bigint NOT NULL REFERENCES account,
        measure_id bigint NOT NULL,
        file_name text NOT NULL,
        file_hash text NOT NULL,
        file_size bigint NOT NULL,
        file_rows integer NOT NULL,
        object_key text NOT NULL,
        state text NOT NULL CHECK (state IN ('uploaded', 'checking', 'checked', 'applying', 'applied',
          'nothing new', 'failed', 'cancelled')),
        delimiter text NOT NULL,
        columns jsonb NOT NULL,
        suggested_mapping jsonb,
        mapping jsonb,
        counts jsonb,
        applied_hash text,
        keep_implausible boolean,
        explanation text,
        problem jsonb,
        job_uid uuid,
        created_at timestamptz NOT NULL,
        checked_at timestamptz,
        applied_at timestamptz,
        version integer NOT NULL DEFAULT 1,
        FOREIGN KEY (study_id, measure_id) REFERENCES measure (study_id, id)
      )`);
    await runner.query('CREATE INDEX import_study ON import (study_id, id)');
    await runner.query(`
      CREATE TABLE import_refusal (
        import_id bigint NOT NULL REFERENCES import,
        line integer NOT NULL,
        subject text NOT NULL,
        value text NOT NULL,
        reason_code text NOT NULL,
        params jsonb NOT NULL DEFAULT '{}',
        PRIMARY KEY (import_id, line)
      )`);
    await runner.query(`
      CREATE TABLE import_implausible (
        import_id bigint NOT NULL REFERENCES import,
        line integer NOT NULL,
        subject text NOT NULL,
        visit text NOT NULL,
        value double precision NOT NULL,
        PRIMARY KEY (import_id, line)
      )`);

    await runner.query(`
      CREATE TABLE visit (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL,
        subject_id bigint NOT NULL,
        planned_visit_id bigint,
        unscheduled_reason text CHECK (length(unscheduled_reason) BETWEEN 1 AND 500),
        date date,
        date_precision text NOT NULL DEFAULT 'day' CHECK (date_precision IN ('day', 'month', 'year')),
        contact_mode text CHECK (contact_mode IN ('in person', 'phone', 'remote')),
        missed_reason text CHECK (missed_reason IN ('ill or in hospital', 'away',
          'could not be reached', 'refused this visit', 'site unable', 'weather or transport',
          'no longer due', 'unknown', 'other')),
        missed_text text,
        import_id bigint REFERENCES import,
        created_at timestamptz NOT NULL,
        created_by bigint NOT NULL REFERENCES account,
        version integer NOT NULL DEFAULT 1,
        UNIQUE (subject_id, id),
        FOREIGN KEY (study_id, subject_id) REFERENCES subject (study_id, id),
        FOREIGN KEY (study_id, planned_visit_id) REFERENCES planned_visit (study_id, id),
        CHECK (num_nonnulls(planned_visit_id, unscheduled_reason) = 1),
        CHECK (num_nonnulls(date, missed_reason) = 1),
        CHECK (missed_reason IS NULL OR planned_visit_id IS NOT NULL),
        CHECK (missed_reason IS DISTINCT FROM 'other' OR length(missed_text) > 0)
      )`);
    await runner.query(`
      CREATE UNIQUE INDEX visit_planned_once ON visit (subject_id, planned_visit_id)
        WHERE planned_visit_id IS NOT NULL`);
    await runner.query('CREATE INDEX visit_study_subject ON visit (study_id, subject_id, id)');
    await runner.query('CREATE INDEX visit_subject_date ON visit (subject_id, date)');
    await runner.query(
      'CREATE INDEX visit_import ON visit (import_id) WHERE import_id IS NOT NULL',
    );

    await runner.query(`
      CREATE TABLE reading (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL,
        subject_id bigint NOT NULL,
        visit_id bigint,
        measure_id bigint NOT NULL,
        replicate integer NOT NULL DEFAULT 1 CHECK (replicate >= 1),
        value double precision CHECK (value > '-Infinity' AND value < 'Infinity'),
        choice text,
        limit_sign text CHECK (limit_sign IN ('<', '>')),
        limit_value double precision CHECK (limit_value > '-Infinity' AND limit_value < 'Infinity'),
        not_done text CHECK (not_done IN ('visit missed', 'subject refused', 'instrument failure',
          'sample lost or inadequate', 'not applicable', 'unknown')),
        explanation text,
        import_id bigint REFERENCES import,
        entered_at timestamptz NOT NULL,
        entered_by bigint NOT NULL REFERENCES account,
        version integer NOT NULL DEFAULT 1,
        FOREIGN KEY (study_id, subject_id) REFERENCES subject (study_id, id),
        FOREIGN KEY (subject_id, visit_id) REFERENCES visit (subject_id, id),
        FOREIGN KEY (study_id, measure_id) REFERENCES measure (study_id, id),
        CHECK (num_nonnulls(value, choice, limit_value, not_done) = 1),
        CHECK ((limit_sign IS NULL) = (limit_value IS NULL))
      )`);
    await runner.query(`
      CREATE UNIQUE INDEX reading_once_a_visit ON reading (visit_id, measure_id, replicate)
        WHERE visit_id IS NOT NULL`);
    await runner.query(`
      CREATE UNIQUE INDEX reading_once_a_subject ON reading (subject_id, measure_id, replicate)
        WHERE visit_id IS NULL`);
    await runner.query('CREATE INDEX reading_subject ON reading (subject_id, id)');
    await runner.query('CREATE INDEX reading_study_measure ON reading (study_id, measure_id, id)');
    await runner.query(
      'CREATE INDEX reading_import ON reading (import_id) WHERE import_id IS NOT NULL',
    );

    await runner.query(`
      CREATE TABLE reading_revision (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        reading_id bigint NOT NULL REFERENCES reading,
        at timestamptz NOT NULL,
        by_account bigint NOT NULL REFERENCES account,
        old_value double precision,
        old_choice text,
        old_limit_sign text,
        old_limit_value double precision,
        old_not_done text,
        new_value double precision,
        new_choice text,
        new_limit_sign text,
        new_limit_value double precision,
        new_not_done text,
        reason text NOT NULL CHECK (reason IN ('transcription error', 'source corrected', 'unit error',
          'wrong subject or visit', 'late source', 'answer to a query', 'other')),
        reason_text text,
        CHECK (reason <> 'other' OR length(reason_text) > 0)
      )`);
    await runner.query(
      'CREATE INDEX reading_revision_reading ON reading_revision (reading_id, id)',
    );
    await runner.query(`
      CREATE TRIGGER revision_never_changes BEFORE UPDATE OR DELETE ON reading_revision
        FOR EACH ROW EXECUTE FUNCTION refuse_change()`);

    await runner.query(`
      CREATE TABLE applied_row (
        study_id bigint NOT NULL REFERENCES study,
        content_hash bytea NOT NULL,
        import_id bigint NOT NULL REFERENCES import,
        reading_id bigint NOT NULL REFERENCES reading,
        PRIMARY KEY (study_id, content_hash)
      )`);
    await runner.query('CREATE INDEX applied_row_import ON applied_row (import_id)');
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of [
      'applied_row',
      'reading_revision',
      'reading',
      'visit',
      'import_implausible',
      'import_refusal',
      'import',
      'subject',
    ]) {
      await runner.query(`DROP TABLE ${table}`);
    }
  }
}
