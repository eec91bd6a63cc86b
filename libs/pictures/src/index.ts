export * from './beam';
export * from './scale-picture';
export * from './shape';
export * from './svg';
export * from './tensor-plate';
