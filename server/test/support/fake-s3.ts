import S3rver from 's3rver';

/** A local store that speaks S3, with one bucket `bench`. */
export async function startFakeS3(directory: string): Promise<{ url: string; stop: () => Promise<void> }> {
  const fake = new S3rver({
    port: 0,
    address: '127.0.0.1',
    silent: true,
    directory,
    configureBuckets: [{ name: 'bench', configs: [] }],
  });
  const address = await fake.run();
  return { url: `http://127.0.0.1:${address.port}`, stop: () => fake.close() };
}
