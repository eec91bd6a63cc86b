export * from './attempts';
export * from './materials';
export * from './part-summaries';
export * from './parts';
export * from './people';
export * from './records';
export * from './settings-changes';
