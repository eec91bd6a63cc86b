export * from './attempts';
export * from './parts';
export * from './people';
export * from './records';
