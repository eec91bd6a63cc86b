import { writeFileSync } from 'node:fs';
import { parseApiEnvironment } from '@masswright/config';
import { createApplication } from '../create-application';
import { createLogger } from '@masswright/logs';
import { createOpenApiDocument } from './document';

// Writes the document that the code describes to the file named. Nothing is connected to: the routes are only looked at.
const [, , file] = process.argv;
if (file === undefined) throw new Error('Name the file to write.');
const settings = parseApiEnvironment({
  DATABASE_URL: 'postgres://nobody@127.0.0.1:1/none',
  S3_ENDPOINT: 'http://127.0.0.1:1',
  S3_BUCKET: 'none',
  S3_ACCESS_KEY_ID: 'none',
  S3_SECRET_ACCESS_KEY: 'none',
  PUBLIC_URL: 'http://127.0.0.1:1',
  LINK_SECRET: '00'.repeat(32),
});
const application = await createApplication(settings, createLogger('openapi', 'silent'));
writeFileSync(file, `${JSON.stringify(createOpenApiDocument(application), null, 2)}\n`);
process.exit(0);
