import { houseFolder } from './folders.mjs';

/** A stand-in for the object store, on loopback, with its files in a folder. What it holds survives a restart. */
export async function startFakeS3({ folder, port = 0 }) {
  const { default: S3rver } = await import('s3rver');
  const bucket = 'cinderpath';
  const server = new S3rver({
    address: '127.0.0.1',
    port,
    silent: true,
    directory: houseFolder(folder),
    configureBuckets: [{ name: bucket, configs: [] }],
  });
  const address = await server.run();
  return {
    env: {
      S3_ENDPOINT: `http://127.0.0.1:${address.port}`,
      S3_REGION: 'us-east-1',
      S3_BUCKET: bucket,
      S3_ACCESS_KEY_ID: 'S3RVER',
      S3_SECRET_ACCESS_KEY: 'S3RVER',
    },
    stop: () => server.close(),
  };
}
