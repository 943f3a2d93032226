// The archive under load: upload of 1 GB with the web process's memory, and lists of 100,000 captures.
import { openAsBlob, statSync } from 'node:fs';
import pg from 'pg';
import { signIn } from '../service.mjs';
import { median, percentile, printTable, readPeakBytes, toMebibytes, toMs } from './measure.mjs';

const MIB = 1024 * 1024;

export async function measureUpload(service, call, file) {
  const sizeBytes = statSync(file).size;
  const before = readPeakBytes(service.webPid);
  const form = new FormData();
  form.append('file', await openAsBlob(file), 'large.wav');
  const startedMs = performance.now();
  const answer = await call('/api/captures', { method: 'POST', body: form });
  const elapsedMs = performance.now() - startedMs;
  if (answer.status !== 201) throw new Error(`the upload answered ${answer.status}: ${await answer.text()}`);
  const row = {
    'size MiB': toMebibytes(sizeBytes),
    ms: toMs(elapsedMs),
    'MiB/s': Math.round(sizeBytes / MIB / (elapsedMs / 1000)),
    'web peak MiB': toMebibytes(readPeakBytes(service.webPid)),
    'before MiB': toMebibytes(before),
  };
  printTable('Upload over loopback, hashed, synced and checked (aim 150 MiB/s, web process under 300 MiB)', [
    row,
  ]);
  return row;
}

/** Multiplies the one capture there is; every column keeps a plausible spread. */
async function fillArchive(databaseUrl, count) {
  const client = new pg.Client({ connectionString: databaseUrl });
  await client.connect();
  try {
    const { rows } = await client.query(
      `select column_name from information_schema.columns where table_name = 'capture' and is_generated = 'NEVER'
         and column_name not in ('id', 'number', 'file_name', 'uploaded_at') order by ordinal_position`,
    );
    const columns = rows.map(({ column_name: name }) => `"${name}"`).join(', ');
    await client.query(
      `insert into capture (id, file_name, uploaded_at, ${columns})
       select gen_random_uuid(), 'take ' || n || ' ' || (array['left','right','warm','cold'])[1 + n % 4] || '.wav',
              now() - n * interval '7 minutes', ${columns}
       from (select * from capture limit 1) as one, generate_series(1, $1::int) as n`,
      [count],
    );
    await client.query('analyze');
  } finally {
    await client.end();
  }
}

const LISTS = [
  '/api/captures?limit=50',
  '/api/captures?limit=50&sort=fileName&order=asc',
  '/api/captures?limit=50&q=warm',
  '/api/captures?limit=50&q=take%2099',
  '/api/captures?limit=50&unsorted=true&since=2026-01-01T00:00:00Z',
  '/api/captures?limit=50&sort=durationS&order=desc',
];

export async function measureList(service, call, count = 100_000, rounds = 20) {
  await fillArchive(service.databaseUrl, count);
  const rows = [];
  for (const list of LISTS) {
    const times = [];
    for (let round = 0; round < rounds; round++) {
      const startedMs = performance.now();
      const answer = await call(list);
      await answer.arrayBuffer();
      if (!answer.ok) throw new Error(`${list} answered ${answer.status}`);
      times.push(performance.now() - startedMs);
    }
    rows.push({ list, 'median ms': median(times).toFixed(1), 'p95 ms': percentile(times, 0.95).toFixed(1) });
  }
  printTable(`Lists of ${count.toLocaleString('en')} captures (aim: p95 under 100 ms)`, rows);
  return rows;
}

export const signInAsReviewer = async (service) => {
  const { demo } = await (await fetch(`${service.url}/api/session`)).json();
  const account = demo.accounts.find(({ roles }) => roles.includes('reviewer'));
  return signIn(service.url, account.email, account.password);
};
