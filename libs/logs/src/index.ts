export * from './logger';
