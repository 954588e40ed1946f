export * from './index.ts';
