/** What `npm test` tells the tests of the services that it started. */
function given(name: string): string {
  const value = process.env[name];
  if (value === undefined) throw new Error(`${name} is not set. Run these tests by: npm test -- --only integration`);
  return value;
}

export const environment = {
  get adminUrl() {
    return given('TEST_DATABASE_ADMIN_URL');
  },
  get template() {
    return given('TEST_DATABASE_TEMPLATE');
  },
  get applicationUrl() {
    return given('TEST_DATABASE_URL');
  },
  get migrationUrl() {
    return given('TEST_DATABASE_MIGRATION_URL');
  },
  get redisUrl() {
    // Runners in parallel must not take each other's jobs.
    return `${given('TEST_REDIS_URL')}/${process.env['VITEST_POOL_ID'] ?? '0'}`;
  },
  get smtpUrl() {
    return given('TEST_SMTP_URL');
  },
  get mailInboxUrl() {
    return given('TEST_MAIL_INBOX_URL');
  },
  get dataDir() {
    return given('TEST_DATA_DIR');
  },
  get buildDir() {
    return given('TEST_BUILD_DIR');
  },
  get pagePorts() {
    return given('TEST_PAGE_PORTS').split(',').map(Number);
  },
  get storage() {
    return {
      endpoint: given('TEST_S3_ENDPOINT'),
      region: given('TEST_S3_REGION'),
      bucket: given('TEST_S3_BUCKET'),
      accessKeyId: given('TEST_S3_ACCESS_KEY_ID'),
      secretAccessKey: given('TEST_S3_SECRET_ACCESS_KEY'),
      forcePathStyle: true,
    };
  },
};
