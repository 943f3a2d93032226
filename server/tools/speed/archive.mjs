// The archive under load: upload of 1 GB with the web process's memory, and lists of 100,000 captures.
import { createReadStream, statSync } from 'node:fs';
import { request } from 'node:http';
import { setTimeout as sleep } from 'node:timers/promises';
import pg from 'pg';
import { signIn } from '../service.mjs';
import { median, percentile, printTable, readPeakBytes, toMebibytes, toMs } from './measure.mjs';

const MIB = 1024 * 1024;

/** Sends one file as a browser does: the form's head, the bytes as they are read, the form's end. */
function sendFile(service, call, file) {
  const boundary = 'benchlark-speed';
  const head = Buffer.from(
    `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="large.wav"\r\nContent-Type: audio/wav\r\n\r\n`,
  );
  const tail = Buffer.from(`\r\n--${boundary}--\r\n`);
  return new Promise((resolve, reject) => {
    const sending = request(`${service.url}/api/captures`, {
      method: 'POST',
      headers: {
        ...call.headers(),
        'content-type': `multipart/form-data; boundary=${boundary}`,
        'content-length': head.length + statSync(file).size + tail.length,
      },
    });
    sending.once('error', reject);
    sending.once('response', async (answer) => {
      const text = Buffer.concat(await answer.toArray()).toString('utf8');
      if (answer.statusCode === 201) resolve();
      else reject(new Error(`the upload answered ${answer.statusCode}: ${text}`));
    });
    sending.write(head);
    const bytes = createReadStream(file, { highWaterMark: MIB });
    bytes.once('error', reject);
    bytes.once('end', () => sending.end(tail));
    bytes.pipe(sending, { end: false });
  });
}

export async function measureUpload(service, call, file) {
  const before = readPeakBytes(service.webPid);
  const startedMs = performance.now();
  await sendFile(service, call, file);
  const elapsedMs = performance.now() - startedMs;
  const sizeBytes = statSync(file).size;
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

/** Waits for what the service still analyses, so that the lists have the machine for themselves. */
async function waitForAnalyses(call) {
  for (;;) {
    const { items } = await (await call('/api/captures?limit=100')).json();
    if (items.every(({ state }) => state !== 'queued' && state !== 'analysing')) return;
    await sleep(500);
  }
}

/** Multiplies the demo's captures, each with bytes, a name and a time of its own. */
async function fillArchive(databaseUrl, count) {
  const client = new pg.Client({ connectionString: databaseUrl });
  await client.connect();
  try {
    const hash = `md5(n::text) || md5('more ' || n)`;
    await client.query(
      `insert into stored_object (sha256, size_bytes, kind) select ${hash}, 1000000 + n, 'capture' from generate_series(1, $1::int) as n`,
      [count],
    );
    const own = [
      'id',
      'number',
      'file_name',
      'file_name_key',
      'uploaded_at',
      'sha256',
      'size_bytes',
      'search',
    ];
    const { rows } = await client.query(
      `select column_name from information_schema.columns where table_name = 'capture' and column_name <> all ($1)`,
      [own],
    );
    const copied = rows.map(({ column_name: name }) => `"${name}"`).join(', ');
    await client.query(
      `insert into capture (file_name, file_name_key, uploaded_at, sha256, size_bytes, search, ${copied})
       select name, name, now() - n * interval '7 minutes', ${hash}, 1000000 + n, name || ' ' || search, ${copied}
       from (select *, row_number() over () as place, count(*) over () as all_of_them from capture) as one
       join generate_series(1, $1::int) as n on one.place = 1 + n % one.all_of_them
       cross join lateral (select 'take ' || n || ' ' || (array['left', 'right', 'warm', 'cold'])[1 + n % 4] || '.wav' as name) as named`,
      [count],
    );
    await client.query('vacuum analyze capture');
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
  await waitForAnalyses(call);
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
