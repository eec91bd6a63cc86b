export * from './format-figure';
export * from './length';
export * from './parse-quantity';
export * from './unit';
export * from './unit-families';
export * from './unit-table';
