export * from './beam';
export * from './shape';
export * from './svg';
export * from './tensor-plate';
