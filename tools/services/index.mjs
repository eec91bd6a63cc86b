export { startMail, prepareMail } from './mail.mjs';
export { startObjectStorage, prepareObjectStorage } from './object-storage.mjs';
export { findFreePort, isPortFree } from './ports.mjs';
export { startPostgres, preparePostgres, findPostgresPrograms } from './postgres.mjs';
export { prepareProgram, startProgram } from './program.mjs';
export { prepareRedis, startRedis } from './redis.mjs';
export { Service, ServiceFailure, stopOrder, wrongEnvironment } from './service.mjs';
