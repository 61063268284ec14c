import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * Who is in which arm. In a study that is not masked: open_arm. In a masked one: the schema `sealed`,
 * whose rows have random keys only, since keys that grow would tell the order of a list.
 */
export class CreateAllocation1796126400006 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE open_arm (
        subject_id bigint PRIMARY KEY,
        study_id bigint NOT NULL,
        masked boolean NOT NULL DEFAULT false CHECK (NOT masked),
        arm_id bigint NOT NULL,
        FOREIGN KEY (study_id, masked) REFERENCES study (id, masked),
        FOREIGN KEY (study_id, subject_id) REFERENCES subject (study_id, id),
        FOREIGN KEY (study_id, arm_id) REFERENCES arm (study_id, id)
      )`);
    await runner.query('CREATE INDEX open_arm_study ON open_arm (study_id)');

    await runner.query('CREATE SCHEMA sealed');
    await runner.query('CREATE SCHEMA released');
    await runner.query(`
      CREATE TABLE sealed.allocation (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        study_id bigint NOT NULL,
        subject_id bigint NOT NULL UNIQUE,
        arm_id bigint NOT NULL,
        listed_at timestamptz NOT NULL,
        FOREIGN KEY (study_id, subject_id) REFERENCES public.subject (study_id, id),
        FOREIGN KEY (study_id, arm_id) REFERENCES public.arm (study_id, id)
      )`);
    await runner.query('CREATE INDEX allocation_study ON sealed.allocation (study_id)');
    await runner.query(`
      CREATE TABLE sealed.code_key (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        study_id bigint NOT NULL,
        arm_id bigint NOT NULL,
        code text NOT NULL CHECK (length(code) BETWEEN 1 AND 16),
        drawn_at timestamptz NOT NULL,
        UNIQUE (study_id, arm_id),
        UNIQUE (study_id, code),
        FOREIGN KEY (study_id, arm_id) REFERENCES public.arm (study_id, id)
      )`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP SCHEMA released CASCADE');
    await runner.query('DROP SCHEMA sealed CASCADE');
    await runner.query('DROP TABLE open_arm');
  }
}
