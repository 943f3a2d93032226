import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Everything by which a person gets in: sessions, API tokens, invitations, resets, and the count of attempts. */
export class CreateAccess1764570000100 implements MigrationInterface {
  readonly name = 'CreateAccess1764570000100';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE bench (
        id smallint NOT NULL DEFAULT 1,
        name text NOT NULL,
        setup_secret_hash text,
        CONSTRAINT pk_bench PRIMARY KEY (id),
        CONSTRAINT ck_bench_single CHECK (id = 1)
      )`);
    await runner.query(`INSERT INTO bench (name) VALUES ('A new bench')`);
    await runner.query(`
      CREATE TABLE session (
        id uuid NOT NULL DEFAULT gen_random_uuid(),
        person_id uuid NOT NULL,
        token_hash text NOT NULL,
        user_agent text NOT NULL,
        created_at timestamptz NOT NULL DEFAULT now(),
        last_seen_at timestamptz NOT NULL DEFAULT now(),
        expires_at timestamptz NOT NULL,
        CONSTRAINT pk_session PRIMARY KEY (id),
        CONSTRAINT uq_session_token_hash UNIQUE (token_hash),
        CONSTRAINT fk_session_person FOREIGN KEY (person_id) REFERENCES person (id) ON DELETE CASCADE
      )`);
    await runner.query('CREATE INDEX ix_session_person ON session (person_id)');
    await runner.query(`
      CREATE TABLE api_token (
        id uuid NOT NULL DEFAULT gen_random_uuid(),
        person_id uuid NOT NULL,
        name text NOT NULL,
        token_hash text NOT NULL,
        created_at timestamptz NOT NULL DEFAULT now(),
        last_used_at timestamptz,
        CONSTRAINT pk_api_token PRIMARY KEY (id),
        CONSTRAINT uq_api_token_token_hash UNIQUE (token_hash),
        CONSTRAINT fk_api_token_person FOREIGN KEY (person_id) REFERENCES person (id) ON DELETE CASCADE
      )`);
    await runner.query('CREATE INDEX ix_api_token_person ON api_token (person_id)');
    await runner.query(`
      CREATE TABLE invitation (
        id uuid NOT NULL DEFAULT gen_random_uuid(),
        token_hash text NOT NULL,
        email text,
        roles text[] NOT NULL,
        invited_by_id uuid NOT NULL,
        created_at timestamptz NOT NULL DEFAULT now(),
        expires_at timestamptz NOT NULL,
        accepted_at timestamptz,
        revoked_at timestamptz,
        CONSTRAINT pk_invitation PRIMARY KEY (id),
        CONSTRAINT uq_invitation_token_hash UNIQUE (token_hash),
        CONSTRAINT fk_invitation_invited_by FOREIGN KEY (invited_by_id) REFERENCES person (id),
        CONSTRAINT ck_invitation_roles CHECK (
          cardinality(roles) > 0
          AND roles <@ ARRAY['technician', 'reviewer', 'peer', 'administrator', 'reader']
        )
      )`);
    await runner.query(`
      CREATE TABLE password_reset (
        id uuid NOT NULL DEFAULT gen_random_uuid(),
        person_id uuid NOT NULL,
        token_hash text NOT NULL,
        created_at timestamptz NOT NULL DEFAULT now(),
        expires_at timestamptz NOT NULL,
        used_at timestamptz,
        CONSTRAINT pk_password_reset PRIMARY KEY (id),
        CONSTRAINT uq_password_reset_token_hash UNIQUE (token_hash),
        CONSTRAINT fk_password_reset_person FOREIGN KEY (person_id) REFERENCES person (id) ON DELETE CASCADE
      )`);
    await runner.query('CREATE INDEX ix_password_reset_person ON password_reset (person_id)');
    await runner.query(`
      CREATE TABLE attempt (
        key text NOT NULL,
        count integer NOT NULL,
        updated_at timestamptz NOT NULL,
        blocked_until timestamptz,
        CONSTRAINT pk_attempt PRIMARY KEY (key)
      )`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE attempt, password_reset, invitation, api_token, session, bench');
  }
}
