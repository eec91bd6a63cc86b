import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';

const makeSecrets = () => ({
  linkSecret: randomBytes(32).toString('hex'),
  metricsToken: randomBytes(24).toString('hex'),
  redisPassword: randomBytes(24).toString('hex'),
  applicationPassword: randomBytes(24).toString('hex'),
  migrationPassword: randomBytes(24).toString('hex'),
  s3AccessKeyId: `local-${randomBytes(8).toString('hex')}`,
  s3SecretAccessKey: randomBytes(24).toString('hex'),
});

/** @typedef {ReturnType<typeof makeSecrets>} Secrets */

/** The secrets of this installation, made once and kept readable for its owner only. @param {string} folder @returns {Secrets} */
export function getSecrets(folder) {
  const file = path.join(folder, 'secrets.json');
  const kept = existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : {};
  const secrets = { ...makeSecrets(), ...kept };
  if (Object.keys(secrets).some((name) => !(name in kept))) {
    mkdirSync(folder, { recursive: true });
    writeFileSync(`${file}.new`, `${JSON.stringify(secrets, null, 2)}\n`, { mode: 0o600 });
    renameSync(`${file}.new`, file);
  }
  return secrets;
}
