export * from './attempts';
export * from './measuring';
export * from './parts';
export * from './people';
export * from './projects';
export * from './records';
export * from './sessions';
export * from './uploads';
