import type { MigrationInterface, QueryRunner } from 'typeorm';

/** How captures of the Live page were taken, and which of them are practice. */
export class CreateTakes1764600000000 implements MigrationInterface {
  readonly name = 'CreateTakes1764600000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE capture
      ADD COLUMN take json,
      ADD COLUMN is_practice boolean NOT NULL DEFAULT false`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE capture DROP COLUMN take, DROP COLUMN is_practice');
  }
}
