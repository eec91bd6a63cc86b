export * from './environment';
