import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Studies as they are set up, and who holds which duty in them. */
export class CreateStudies1796126400003 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    // UNIQUE (id, masked) is what open_arm points at: a row there for a masked study can't exist.
    await runner.query(`
      CREATE TABLE study (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 200),
        short_name text NOT NULL UNIQUE CHECK (length(short_name) BETWEEN 1 AND 40),
        masked boolean NOT NULL,
        state text NOT NULL DEFAULT 'open' CHECK (state IN ('open', 'locked', 'closed')),
        closing_days integer NOT NULL DEFAULT 3 CHECK (closing_days BETWEEN 0 AND 60),
        late_days integer NOT NULL DEFAULT 14 CHECK (late_days BETWEEN 0 AND 365),
        created_at timestamptz NOT NULL,
        version integer NOT NULL DEFAULT 1,
        UNIQUE (id, masked)
      )`);
    await runner.query(`
      CREATE TABLE site (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        code text NOT NULL CHECK (code ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,31}$'),
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 120),
        time_zone text NOT NULL,
        UNIQUE (study_id, code),
        UNIQUE (study_id, id)
      )`);
    await runner.query(`
      CREATE TABLE arm (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 80),
        position integer NOT NULL,
        UNIQUE (study_id, name),
        UNIQUE (study_id, position),
        UNIQUE (study_id, id)
      )`);
    await runner.query(`
      CREATE TABLE measure (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        short_name text NOT NULL CHECK (
          short_name ~ '^[a-z][a-z0-9_]{0,30}$' AND short_name !~ '_note$'
          AND short_name NOT IN ('subject', 'site', 'visit', 'planned', 'day', 'planned_day',
                                 'replicate', 'group', 'code', 'stamp')),
        label text NOT NULL CHECK (length(label) BETWEEN 1 AND 120),
        unit text,
        decimals integer NOT NULL CHECK (decimals BETWEEN 0 AND 10),
        nature text NOT NULL CHECK (nature IN ('continuous', 'positive', 'count', 'yes_no', 'choice')),
        per text NOT NULL CHECK (per IN ('visit', 'subject')),
        plausible_low double precision,
        plausible_high double precision,
        impossible_low double precision,
        impossible_high double precision,
        alert_low double precision,
        alert_high double precision,
        concern text CHECK (concern IN ('high', 'low', 'both')),
        choices jsonb,
        position integer NOT NULL,
        UNIQUE (study_id, short_name),
        UNIQUE (study_id, position),
        UNIQUE (study_id, id),
        CHECK ((nature = 'choice') = (choices IS NOT NULL)),
        CHECK (plausible_low <= plausible_high),
        CHECK (impossible_low < impossible_high)
      )`);
    await runner.query(`
      CREATE TABLE planned_visit (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 60 AND name <> 'unscheduled'),
        target_day integer NOT NULL,
        window_before integer NOT NULL CHECK (window_before >= 0),
        window_after integer NOT NULL CHECK (window_after >= 0),
        position integer NOT NULL,
        UNIQUE (study_id, name),
        UNIQUE (study_id, position),
        UNIQUE (study_id, target_day),
        UNIQUE (study_id, id)
      )`);
    await runner.query(`
      CREATE TABLE membership (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        study_id bigint NOT NULL REFERENCES study,
        account_id bigint NOT NULL REFERENCES account,
        role text NOT NULL CHECK (role IN ('owner', 'coordinator', 'monitor', 'analyst',
          'unblinded statistician', 'board member', 'safety officer')),
        chair boolean NOT NULL DEFAULT false CHECK (NOT chair OR role = 'board member'),
        created_at timestamptz NOT NULL,
        removed_at timestamptz,
        version integer NOT NULL DEFAULT 1,
        UNIQUE (study_id, id)
      )`);
    await runner.query(`
      CREATE UNIQUE INDEX membership_once ON membership (study_id, account_id, role)
        WHERE removed_at IS NULL`);
    await runner.query('CREATE INDEX membership_account ON membership (account_id)');
    await runner.query(`
      CREATE TABLE membership_site (
        membership_id bigint NOT NULL REFERENCES membership,
        site_id bigint NOT NULL REFERENCES site,
        PRIMARY KEY (membership_id, site_id)
      )`);

    await this.#guardDuties(runner);

    await runner.query(`
      CREATE TABLE job (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        uid uuid NOT NULL DEFAULT uuid_v7() UNIQUE,
        kind text NOT NULL,
        study_id bigint REFERENCES study,
        account_id bigint REFERENCES account,
        subject_uid uuid,
        state text NOT NULL DEFAULT 'waiting'
          CHECK (state IN ('waiting', 'running', 'done', 'failed', 'cancelled')),
        done integer NOT NULL DEFAULT 0,
        total integer,
        message_code text,
        created_at timestamptz NOT NULL,
        started_at timestamptz,
        finished_at timestamptz,
        cancel_requested boolean NOT NULL DEFAULT false,
        problem jsonb
      )`);
    await runner.query('CREATE INDEX job_study ON job (study_id, id)');
    await runner.query('CREATE INDEX job_subject ON job (subject_uid, id)');
  }

  /** The last line against duties that exclude each other; the service refuses first, in words. */
  async #guardDuties(runner: QueryRunner): Promise<void> {
    // The account's row is locked, so that two grants at once can't each miss the other.
    await runner.query(`
      CREATE FUNCTION public.refuse_excluded_duties() RETURNS trigger LANGUAGE plpgsql AS $$
      DECLARE
        is_administrator boolean;
      BEGIN
        IF NEW.removed_at IS NOT NULL THEN
          RETURN NEW;
        END IF;
        SELECT administrator INTO is_administrator FROM public.account WHERE id = NEW.account_id FOR UPDATE;
        IF is_administrator THEN
          RAISE EXCEPTION 'an administrator holds no membership' USING ERRCODE = '23514', CONSTRAINT = 'membership_duties';
        END IF;
        IF EXISTS (
          SELECT 1 FROM public.membership other
           WHERE other.study_id = NEW.study_id AND other.account_id = NEW.account_id
             AND other.removed_at IS NULL AND other.id <> NEW.id AND other.role <> NEW.role
             AND (NEW.role IN ('unblinded statistician', 'board member')
                  OR other.role IN ('unblinded statistician', 'board member'))
        ) THEN
          RAISE EXCEPTION 'these duties exclude each other in one study' USING ERRCODE = '23514', CONSTRAINT = 'membership_duties';
        END IF;
        RETURN NEW;
      END $$`);
    await runner.query(`
      CREATE TRIGGER membership_duties BEFORE INSERT OR UPDATE ON membership
        FOR EACH ROW EXECUTE FUNCTION refuse_excluded_duties()`);
    await runner.query(`
      CREATE FUNCTION public.refuse_administrator_with_membership() RETURNS trigger LANGUAGE plpgsql AS $$
      BEGIN
        IF EXISTS (SELECT 1 FROM public.membership WHERE account_id = NEW.id AND removed_at IS NULL) THEN
          RAISE EXCEPTION 'an administrator holds no membership' USING ERRCODE = '23514', CONSTRAINT = 'membership_duties';
        END IF;
        RETURN NEW;
      END $$`);
    await runner.query(`
      CREATE TRIGGER account_administrator BEFORE UPDATE OF administrator ON account
        FOR EACH ROW WHEN (NEW.administrator) EXECUTE FUNCTION refuse_administrator_with_membership()`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TRIGGER account_administrator ON account');
    await runner.query('DROP FUNCTION refuse_administrator_with_membership()');
    for (const table of [
      'job',
      'membership_site',
      'membership',
      'planned_visit',
      'measure',
      'arm',
      'site',
      'study',
    ]) {
      await runner.query(`DROP TABLE ${table}`);
    }
    await runner.query('DROP FUNCTION refuse_excluded_duties()');
  }
}
