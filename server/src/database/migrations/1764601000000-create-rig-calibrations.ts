import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Facts of a rig, its calibrations and its loopback baselines. */
export class CreateRigCalibrations1764601000000 implements MigrationInterface {
  readonly name = 'CreateRigCalibrations1764601000000';

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of UP) await runner.query(statement);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const statement of DOWN) await runner.query(statement);
  }
}

const KEPT_TABLES = ['rig_calibration', 'rig_baseline'];

const UP = [
  `ALTER TABLE rig
    ADD COLUMN interface text NOT NULL DEFAULT '',
    ADD COLUMN source text NOT NULL DEFAULT '',
    ADD COLUMN cables text NOT NULL DEFAULT '',
    ADD COLUMN supply text NOT NULL DEFAULT '',
    ADD COLUMN load text NOT NULL DEFAULT '',
    ADD COLUMN limit_dbfs double precision,
    ADD CONSTRAINT ck_rig_limit_dbfs CHECK (limit_dbfs <= 0)`,
  `CREATE TABLE rig_calibration (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    rig_id uuid NOT NULL,
    channel text NOT NULL,
    direction text NOT NULL,
    range text NOT NULL,
    sample_rate_hz integer NOT NULL,
    frequency_hz double precision NOT NULL,
    volts_rms_at_full_scale double precision NOT NULL,
    divider_ratio double precision NOT NULL DEFAULT 1,
    load_ohm double precision,
    meter text NOT NULL,
    meter_uncertainty_percent double precision NOT NULL,
    taken_on date NOT NULL,
    valid_until date NOT NULL,
    notes text NOT NULL DEFAULT '',
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    created_by uuid NOT NULL,
    retired_at timestamptz(3),
    retired_by uuid,
    CONSTRAINT pk_rig_calibration PRIMARY KEY (id),
    CONSTRAINT fk_rig_calibration_rig FOREIGN KEY (rig_id) REFERENCES rig (id),
    CONSTRAINT fk_rig_calibration_creator FOREIGN KEY (created_by) REFERENCES person (id),
    CONSTRAINT fk_rig_calibration_retirer FOREIGN KEY (retired_by) REFERENCES person (id),
    CONSTRAINT ck_rig_calibration_channel CHECK (channel IN ('left', 'right', 'all')),
    CONSTRAINT ck_rig_calibration_direction CHECK (direction IN ('input', 'output')),
    CONSTRAINT ck_rig_calibration_volts CHECK (volts_rms_at_full_scale > 0),
    CONSTRAINT ck_rig_calibration_divider CHECK (divider_ratio >= 1),
    CONSTRAINT ck_rig_calibration_uncertainty CHECK (meter_uncertainty_percent >= 0),
    CONSTRAINT ck_rig_calibration_validity CHECK (valid_until >= taken_on),
    CONSTRAINT ck_rig_calibration_retired CHECK ((retired_at IS NULL) = (retired_by IS NULL))
  )`,
  'CREATE INDEX ix_rig_calibration_rig ON rig_calibration (rig_id, taken_on)',
  `CREATE TABLE rig_baseline (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    rig_id uuid NOT NULL,
    capture_id uuid NOT NULL,
    record_id uuid NOT NULL,
    input_range text NOT NULL,
    sample_rate_hz integer NOT NULL,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    created_by uuid NOT NULL,
    retired_at timestamptz(3),
    retired_by uuid,
    CONSTRAINT pk_rig_baseline PRIMARY KEY (id),
    CONSTRAINT fk_rig_baseline_rig FOREIGN KEY (rig_id) REFERENCES rig (id),
    CONSTRAINT fk_rig_baseline_capture FOREIGN KEY (capture_id) REFERENCES capture (id),
    CONSTRAINT fk_rig_baseline_record FOREIGN KEY (record_id) REFERENCES record (id),
    CONSTRAINT fk_rig_baseline_creator FOREIGN KEY (created_by) REFERENCES person (id),
    CONSTRAINT fk_rig_baseline_retirer FOREIGN KEY (retired_by) REFERENCES person (id),
    CONSTRAINT ck_rig_baseline_retired CHECK ((retired_at IS NULL) = (retired_by IS NULL))
  )`,
  'CREATE INDEX ix_rig_baseline_rig ON rig_baseline (rig_id, created_at)',
  `CREATE UNIQUE INDEX uq_rig_baseline_record ON rig_baseline (rig_id, record_id, input_range)
   WHERE retired_at IS NULL`,
  // The one change a row may see is its retirement, once; everything else of it must stay as it was.
  `CREATE FUNCTION allow_retiring_only() RETURNS trigger LANGUAGE plpgsql AS $$
   BEGIN
     IF OLD.retired_at IS NOT NULL OR NEW.retired_at IS NULL
       OR to_jsonb(NEW) - 'retired_at' - 'retired_by' <> to_jsonb(OLD) - 'retired_at' - 'retired_by' THEN
       RAISE EXCEPTION '% rows can only be retired, once', TG_TABLE_NAME USING ERRCODE = 'restrict_violation';
     END IF;
     RETURN NEW;
   END $$`,
  ...KEPT_TABLES.flatMap((table) => [
    `CREATE TRIGGER ${table}_is_immutable BEFORE UPDATE ON ${table}
     FOR EACH ROW EXECUTE FUNCTION allow_retiring_only()`,
    `CREATE TRIGGER ${table}_is_kept BEFORE DELETE OR TRUNCATE ON ${table}
     FOR EACH STATEMENT EXECUTE FUNCTION refuse_archive_change()`,
  ]),
];

const DOWN = [
  'DROP TABLE rig_baseline, rig_calibration',
  'DROP FUNCTION allow_retiring_only()',
  `ALTER TABLE rig DROP COLUMN interface, DROP COLUMN source, DROP COLUMN cables, DROP COLUMN supply,
    DROP COLUMN load, DROP COLUMN limit_dbfs`,
];
