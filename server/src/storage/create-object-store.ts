import { join } from 'node:path';
import type { Env } from '../config/env.schema';
import { FolderStore } from './folder-store';
import type { ObjectStore } from './object-store';
import { S3Store } from './s3-store';

/** The store that the configuration asks for; not opened yet. */
export function createObjectStore(env: Env): ObjectStore {
  if (env.STORAGE_KIND === 'folder') return new FolderStore(env.STORE_DIR);
  if (!env.S3_BUCKET) throw new Error('S3_BUCKET must be set when STORAGE_KIND is s3');
  return new S3Store({
    endpoint: env.S3_ENDPOINT,
    region: env.S3_REGION,
    bucket: env.S3_BUCKET,
    prefix: env.S3_PREFIX,
    accessKeyId: env.S3_ACCESS_KEY_ID,
    secretAccessKey: env.S3_SECRET_ACCESS_KEY,
    forcePathStyle: env.S3_FORCE_PATH_STYLE,
    tempFolder: join(env.STORE_DIR, 'incoming'),
  });
}
