import type { MigrationInterface, QueryRunner } from 'typeorm';

export class CreatePeople1764570000000 implements MigrationInterface {
  readonly name = 'CreatePeople1764570000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE person (
        id uuid NOT NULL DEFAULT gen_random_uuid(),
        display_name text NOT NULL,
        email text NOT NULL,
        password_hash text NOT NULL,
        is_disabled boolean NOT NULL DEFAULT false,
        created_at timestamptz NOT NULL DEFAULT now(),
        last_seen_at timestamptz,
        CONSTRAINT pk_person PRIMARY KEY (id),
        CONSTRAINT uq_person_email UNIQUE (email),
        CONSTRAINT ck_person_email_lower CHECK (email = lower(email))
      )`);
    await runner.query(`
      CREATE TABLE person_role (
        person_id uuid NOT NULL,
        role text NOT NULL,
        CONSTRAINT pk_person_role PRIMARY KEY (person_id, role),
        CONSTRAINT fk_person_role_person FOREIGN KEY (person_id) REFERENCES person (id) ON DELETE CASCADE,
        CONSTRAINT ck_person_role_role
          CHECK (role IN ('technician', 'reviewer', 'peer', 'administrator', 'reader'))
      )`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE person_role');
    await runner.query('DROP TABLE person');
  }
}
