import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Units, conditions, rigs, stored objects, captures, jobs, records with their figures and traces. */
export class CreateArchive1764580000060 implements MigrationInterface {
  readonly name = 'CreateArchive1764580000060';

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of UP) await runner.query(statement);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const statement of DOWN) await runner.query(statement);
  }
}

const FILING = [
  `CREATE TABLE unit (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    maker text NOT NULL,
    model text NOT NULL,
    serial_number text,
    kind text NOT NULL DEFAULT 'other',
    notes text NOT NULL DEFAULT '',
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    search text NOT NULL,
    CONSTRAINT pk_unit PRIMARY KEY (id),
    CONSTRAINT ck_unit_kind CHECK (kind IN
      ('converter', 'headphone-amplifier', 'power-amplifier', 'streamer', 'phono-stage', 'other'))
  )`,
  `CREATE INDEX ix_unit_search ON unit (search COLLATE "C", id)`,
  `CREATE TABLE unit_condition (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    unit_id uuid NOT NULL,
    name text NOT NULL,
    notes text NOT NULL DEFAULT '',
    started_on date,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    CONSTRAINT pk_unit_condition PRIMARY KEY (id),
    CONSTRAINT uq_unit_condition_name UNIQUE (unit_id, name),
    CONSTRAINT fk_unit_condition_unit FOREIGN KEY (unit_id) REFERENCES unit (id)
  )`,
  `CREATE TABLE rig (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    name text NOT NULL,
    notes text NOT NULL DEFAULT '',
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    CONSTRAINT pk_rig PRIMARY KEY (id),
    CONSTRAINT uq_rig_name UNIQUE (name)
  )`,
];

const CAPTURES = [
  `CREATE TABLE stored_object (
    sha256 text NOT NULL,
    size_bytes bigint NOT NULL,
    kind text NOT NULL,
    stored_at timestamptz NOT NULL DEFAULT now(),
    evidence text NOT NULL DEFAULT 'sound',
    checked_at timestamptz,
    CONSTRAINT pk_stored_object PRIMARY KEY (sha256),
    CONSTRAINT ck_stored_object_evidence CHECK (evidence IN ('sound', 'damaged', 'missing')),
    CONSTRAINT ck_stored_object_kind CHECK (kind IN ('capture', 'trace'))
  )`,
  `CREATE INDEX ix_stored_object_checked_at ON stored_object (checked_at, sha256)`,
  `CREATE INDEX ix_stored_object_unsound ON stored_object (evidence) WHERE evidence <> 'sound'`,
  `CREATE TABLE capture_overview (
    sha256 text NOT NULL,
    content json NOT NULL,
    CONSTRAINT pk_capture_overview PRIMARY KEY (sha256),
    CONSTRAINT fk_capture_overview_object FOREIGN KEY (sha256) REFERENCES stored_object (sha256)
  )`,
  `CREATE TABLE capture (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    number serial NOT NULL,
    file_name text NOT NULL,
    file_name_key text NOT NULL,
    sha256 text NOT NULL,
    size_bytes bigint NOT NULL,
    uploaded_at timestamptz(3) NOT NULL DEFAULT now(),
    uploaded_by uuid NOT NULL,
    note text NOT NULL DEFAULT '',
    unit_id uuid,
    condition_id uuid,
    rig_id uuid,
    sample_rate_hz integer NOT NULL,
    channel_count integer NOT NULL,
    bits_per_sample integer NOT NULL,
    sample_format text NOT NULL,
    frame_count bigint NOT NULL,
    duration_s double precision NOT NULL,
    file_warnings json NOT NULL,
    state text NOT NULL DEFAULT 'queued',
    job_id uuid,
    record_id uuid,
    measure text NOT NULL DEFAULT '',
    has_warnings boolean NOT NULL DEFAULT false,
    unit_key text NOT NULL DEFAULT '',
    search text NOT NULL DEFAULT '',
    CONSTRAINT pk_capture PRIMARY KEY (id),
    CONSTRAINT uq_capture_number UNIQUE (number),
    CONSTRAINT fk_capture_object FOREIGN KEY (sha256) REFERENCES stored_object (sha256),
    CONSTRAINT fk_capture_person FOREIGN KEY (uploaded_by) REFERENCES person (id),
    CONSTRAINT fk_capture_unit FOREIGN KEY (unit_id) REFERENCES unit (id),
    CONSTRAINT fk_capture_condition FOREIGN KEY (condition_id) REFERENCES unit_condition (id),
    CONSTRAINT fk_capture_rig FOREIGN KEY (rig_id) REFERENCES rig (id),
    CONSTRAINT ck_capture_size_bytes CHECK (size_bytes > 0),
    CONSTRAINT ck_capture_condition CHECK (condition_id IS NULL OR unit_id IS NOT NULL),
    CONSTRAINT ck_capture_state CHECK (state IN ('queued', 'analysing', 'done', 'failed', 'cancelled'))
  )`,
  `CREATE INDEX ix_capture_sha256 ON capture (sha256, number)`,
  `CREATE INDEX ix_capture_uploaded_at ON capture (uploaded_at, number)`,
  `CREATE INDEX ix_capture_size_bytes ON capture (size_bytes, number)`,
  `CREATE INDEX ix_capture_duration_s ON capture (duration_s, number)`,
  `CREATE INDEX ix_capture_file_name ON capture (file_name_key COLLATE "C", number)`,
  `CREATE INDEX ix_capture_unit_key ON capture (unit_key COLLATE "C", number)`,
  `CREATE INDEX ix_capture_measure ON capture (measure COLLATE "C", number)`,
  `CREATE INDEX ix_capture_unit ON capture (unit_id, number)`,
  `CREATE INDEX ix_capture_condition ON capture (condition_id, number)`,
  `CREATE INDEX ix_capture_rig ON capture (rig_id, number)`,
  `CREATE INDEX ix_capture_state ON capture (state, number)`,
  `CREATE INDEX ix_capture_warnings ON capture (number) WHERE has_warnings`,
  `CREATE TABLE upload_key (
    person_id uuid NOT NULL,
    key text NOT NULL,
    fingerprint text NOT NULL,
    capture_id uuid NOT NULL,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    CONSTRAINT pk_upload_key PRIMARY KEY (person_id, key),
    CONSTRAINT fk_upload_key_person FOREIGN KEY (person_id) REFERENCES person (id),
    CONSTRAINT fk_upload_key_capture FOREIGN KEY (capture_id) REFERENCES capture (id)
  )`,
  // Searching inside a word wants trigrams. Where the database can't have the extension the search reads the column.
  `DO $$ BEGIN
    CREATE EXTENSION IF NOT EXISTS pg_trgm;
    CREATE INDEX ix_capture_search ON capture USING gin (search gin_trgm_ops);
  EXCEPTION WHEN insufficient_privilege OR undefined_file OR feature_not_supported THEN
    RAISE NOTICE 'pg_trgm is not available: searches read the whole column';
  END $$`,
];

const JOBS = [
  `CREATE TABLE worker (
    id text NOT NULL,
    started_at timestamptz(3) NOT NULL DEFAULT now(),
    seen_at timestamptz(3) NOT NULL DEFAULT now(),
    CONSTRAINT pk_worker PRIMARY KEY (id)
  )`,
  `CREATE TABLE analysis_job (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    capture_id uuid NOT NULL,
    job_key text NOT NULL,
    measure text,
    settings json NOT NULL,
    dsp_version text NOT NULL,
    priority integer NOT NULL DEFAULT 0,
    state text NOT NULL DEFAULT 'queued',
    progress double precision NOT NULL DEFAULT 0,
    attempts integer NOT NULL DEFAULT 0,
    max_attempts integer NOT NULL,
    worker_id text,
    failure_code text,
    failure_message text,
    requested_by uuid NOT NULL,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    started_at timestamptz(3),
    ended_at timestamptz(3),
    CONSTRAINT pk_analysis_job PRIMARY KEY (id),
    CONSTRAINT uq_analysis_job_key UNIQUE (capture_id, job_key),
    CONSTRAINT fk_analysis_job_capture FOREIGN KEY (capture_id) REFERENCES capture (id),
    CONSTRAINT fk_analysis_job_person FOREIGN KEY (requested_by) REFERENCES person (id),
    CONSTRAINT ck_analysis_job_state CHECK (state IN ('queued', 'running', 'done', 'failed', 'cancelled'))
  )`,
  `CREATE INDEX ix_analysis_job_state ON analysis_job (state, created_at)`,
  `ALTER TABLE capture ADD CONSTRAINT fk_capture_job FOREIGN KEY (job_id) REFERENCES analysis_job (id)`,
];

const RECORDS = [
  `CREATE TABLE record (
    id uuid NOT NULL DEFAULT gen_random_uuid(),
    capture_id uuid NOT NULL,
    job_id uuid NOT NULL,
    ordinal integer NOT NULL,
    measure text NOT NULL,
    dsp_version text NOT NULL,
    settings json NOT NULL,
    content json NOT NULL,
    supersedes_id uuid,
    main_figure json,
    sketch json NOT NULL,
    warning_count integer NOT NULL,
    recognised_as text,
    stimulus_name text,
    fundamental_frequency_hz double precision,
    fundamental_level_dbfs double precision,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    CONSTRAINT pk_record PRIMARY KEY (id),
    CONSTRAINT uq_record_ordinal UNIQUE (capture_id, ordinal),
    CONSTRAINT uq_record_job UNIQUE (job_id),
    CONSTRAINT uq_record_supersedes UNIQUE (supersedes_id),
    CONSTRAINT fk_record_capture FOREIGN KEY (capture_id) REFERENCES capture (id),
    CONSTRAINT fk_record_job FOREIGN KEY (job_id) REFERENCES analysis_job (id),
    CONSTRAINT fk_record_supersedes FOREIGN KEY (supersedes_id) REFERENCES record (id)
  )`,
  `CREATE TABLE record_figure (
    record_id uuid NOT NULL,
    segment integer NOT NULL,
    channel text NOT NULL,
    key text NOT NULL,
    value double precision,
    word text,
    limit_by text,
    margin_db double precision,
    expanded_uncertainty double precision,
    CONSTRAINT pk_record_figure PRIMARY KEY (record_id, segment, channel, key),
    CONSTRAINT fk_record_figure_record FOREIGN KEY (record_id) REFERENCES record (id)
  )`,
  `CREATE INDEX ix_record_figure_key_value ON record_figure (key, value)`,
  `CREATE TABLE record_trace (
    record_id uuid NOT NULL,
    segment integer NOT NULL,
    channel text NOT NULL,
    name text NOT NULL,
    sha256 text NOT NULL,
    points integer NOT NULL,
    x_unit text NOT NULL,
    y_unit text NOT NULL,
    CONSTRAINT pk_record_trace PRIMARY KEY (record_id, segment, channel, name),
    CONSTRAINT fk_record_trace_record FOREIGN KEY (record_id) REFERENCES record (id),
    CONSTRAINT fk_record_trace_object FOREIGN KEY (sha256) REFERENCES stored_object (sha256)
  )`,
  `CREATE INDEX ix_record_trace_sha256 ON record_trace (sha256)`,
  `ALTER TABLE capture ADD CONSTRAINT fk_capture_record FOREIGN KEY (record_id) REFERENCES record (id)`,
];

const IMMUTABILITY = [
  `CREATE FUNCTION refuse_archive_change() RETURNS trigger LANGUAGE plpgsql AS $$
   BEGIN
     RAISE EXCEPTION '% rows are never changed or deleted', TG_TABLE_NAME USING ERRCODE = 'restrict_violation';
   END $$`,
  ...['record', 'record_figure', 'record_trace'].flatMap((table) => [
    `CREATE TRIGGER ${table}_is_immutable BEFORE UPDATE OR DELETE ON ${table}
     FOR EACH ROW EXECUTE FUNCTION refuse_archive_change()`,
    `CREATE TRIGGER ${table}_is_kept BEFORE TRUNCATE ON ${table}
     FOR EACH STATEMENT EXECUTE FUNCTION refuse_archive_change()`,
  ]),
  // What a capture is can't change; how it is filed and how far its analysis is may.
  `CREATE TRIGGER capture_is_immutable BEFORE UPDATE OF id, number, sha256, size_bytes, file_name, uploaded_at,
     uploaded_by, sample_rate_hz, channel_count, bits_per_sample, sample_format, frame_count, duration_s, file_warnings
   ON capture FOR EACH ROW EXECUTE FUNCTION refuse_archive_change()`,
  `CREATE TRIGGER capture_is_kept BEFORE DELETE OR TRUNCATE ON capture
   FOR EACH STATEMENT EXECUTE FUNCTION refuse_archive_change()`,
];

const UP = [...FILING, ...CAPTURES, ...JOBS, ...RECORDS, ...IMMUTABILITY];

const DOWN = [
  'ALTER TABLE capture DROP CONSTRAINT fk_capture_record, DROP CONSTRAINT fk_capture_job',
  'DROP TABLE record_trace, record_figure, record, analysis_job, worker, upload_key, capture',
  'DROP TABLE capture_overview, stored_object, rig, unit_condition, unit',
  'DROP FUNCTION refuse_archive_change()',
];
