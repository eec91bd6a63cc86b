// The local object storage as a process of its own: node storage/fake/main.mjs, with its settings in the environment.
// FAKE_S3_DIRECTORY, FAKE_S3_PORT (0: any), FAKE_S3_ORIGINS (comma-separated), S3_BUCKET, S3_REGION, S3_ACCESS_KEY_ID, S3_SECRET_ACCESS_KEY.
import { startFakeObjectStorage } from './server.mjs';

/** @param {string} name */
function getSetting(name) {
  const value = process.env[name];
  if (value === undefined || value === '') {
    console.error(`${name} must be set.`);
    process.exit(78);
  }
  return value;
}

const storage = await startFakeObjectStorage({
  directory: getSetting('FAKE_S3_DIRECTORY'),
  port: Number(process.env.FAKE_S3_PORT ?? 0),
  bucket: getSetting('S3_BUCKET'),
  region: getSetting('S3_REGION'),
  accessKeyId: getSetting('S3_ACCESS_KEY_ID'),
  secretAccessKey: getSetting('S3_SECRET_ACCESS_KEY'),
  allowedOrigins: (process.env.FAKE_S3_ORIGINS ?? '').split(',').filter((origin) => origin !== ''),
});
console.log(JSON.stringify({ event: 'listening', port: storage.port }));

for (const signal of ['SIGINT', 'SIGTERM']) {
  process.once(signal, () => {
    void storage.close().then(() => process.exit(0));
  });
}
