import type { MigrationInterface, QueryRunner } from 'typeorm';

export class CreateMailAndAudit1764570000200 implements MigrationInterface {
  readonly name = 'CreateMailAndAudit1764570000200';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE mail_message (
        id uuid NOT NULL DEFAULT gen_random_uuid(),
        recipient text NOT NULL,
        subject text NOT NULL,
        sealed_text bytea,
        state text NOT NULL DEFAULT 'queued',
        attempts integer NOT NULL DEFAULT 0,
        created_at timestamptz NOT NULL DEFAULT now(),
        due_at timestamptz NOT NULL DEFAULT now(),
        last_error text,
        CONSTRAINT pk_mail_message PRIMARY KEY (id),
        CONSTRAINT ck_mail_message_state CHECK (state IN ('queued', 'sending', 'sent', 'failed'))
      )`);
    await runner.query(
      `CREATE INDEX ix_mail_message_due ON mail_message (due_at) WHERE state IN ('queued', 'sending')`,
    );
    await runner.query(`
      CREATE TABLE audit_entry (
        id bigint GENERATED ALWAYS AS IDENTITY,
        at timestamptz NOT NULL DEFAULT clock_timestamp(),
        actor_id uuid,
        actor_name text,
        action text NOT NULL,
        subject text,
        detail text,
        ip text,
        request_id text,
        CONSTRAINT pk_audit_entry PRIMARY KEY (id)
      )`);
    // The rule holds for the table's owner too, whom REVOKE would not stop.
    await runner.query(`
      CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
      BEGIN
        RAISE EXCEPTION 'rows of % are never changed', TG_TABLE_NAME USING ERRCODE = 'insufficient_privilege';
      END $$`);
    await runner.query(`
      CREATE TRIGGER tr_audit_entry_append_only
        BEFORE UPDATE OR DELETE OR TRUNCATE ON audit_entry
        FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()`);
    await runner.query('REVOKE UPDATE, DELETE, TRUNCATE ON audit_entry FROM PUBLIC, CURRENT_USER');
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE audit_entry, mail_message');
    await runner.query('DROP FUNCTION refuse_change()');
  }
}
