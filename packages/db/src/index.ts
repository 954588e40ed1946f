export * from './client.ts';
export * from './migrate.ts';
export * from './queries/listen.ts';
export * as schema from './schema.ts';
