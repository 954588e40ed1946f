export * from './client.ts';
export * from './listen.ts';
export * from './migrate.ts';
export * as schema from './schema.ts';
