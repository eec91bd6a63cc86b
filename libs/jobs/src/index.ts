export * from './jobs';
export * from './link-token';
