import { availableParallelism } from 'node:os';
import { resolve } from 'node:path';
import { z } from 'zod';

const positiveInteger = (fallback: number) => z.coerce.number().int().positive().default(fallback);

/** Where bytes are kept: a folder of this machine, or any S3-compatible store. */
export const storageEnvShape = {
  STORAGE_KIND: z.enum(['folder', 's3']).default('folder'),
  /** The folder store itself; with S3 the place of files that are still arriving. */
  STORE_DIR: z
    .string()
    .default(resolve(__dirname, '../../../.run/store'))
    .transform((path) => resolve(path)),
  /** An upload that would leave less than this free is refused. */
  STORAGE_MIN_FREE_BYTES: z.coerce.number().int().min(0).default(268_435_456),
  S3_ENDPOINT: z.url({ protocol: /^https?$/ }).optional(),
  S3_REGION: z.string().default('us-east-1'),
  S3_BUCKET: z.string().optional(),
  S3_PREFIX: z.string().default(''),
  S3_ACCESS_KEY_ID: z.string().optional(),
  S3_SECRET_ACCESS_KEY: z.string().optional(),
  S3_FORCE_PATH_STYLE: z.stringbool().default(true),
  /** An upload from which no byte came for so long is cut off. */
  UPLOAD_STALL_MS: positiveInteger(30_000),
};

/** How the worker process runs. */
export const jobsEnvShape = {
  WORKER_CONCURRENCY: positiveInteger(Math.max(1, Math.min(4, availableParallelism() - 1))),
  WORKER_HEARTBEAT_MS: positiveInteger(3_000),
  /** A worker silent for so long counts as dead; by the database's clock. */
  WORKER_SILENT_MS: positiveInteger(12_000),
  JOB_MAX_ATTEMPTS: positiveInteger(3),
  /** Heap limit of the thread that analyses; it fails alone when it needs more. */
  ANALYSIS_MEMORY_MB: positiveInteger(1_024),
  /** A thread without any progress for so long is ended and counts as a failed attempt. */
  ANALYSIS_STALL_MS: positiveInteger(600_000),
  /** When the whole store is re-hashed, and when leftovers are swept (cron, UTC). */
  EVIDENCE_CRON: z.string().default('10 3 * * *'),
  SWEEP_CRON: z.string().default('40 3 * * *'),
  /** False: the scheduled sweep of orphan objects only reports. */
  SWEEP_REMOVES_ORPHANS: z.stringbool().default(false),
};
