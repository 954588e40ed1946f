import { defineConfig } from 'drizzle-kit';

export default defineConfig({
  dialect: 'postgresql',
  schema: './packages/db/src/schema/**/*.ts',
  out: './drizzle',
  casing: 'snake_case',
  strict: true,
  verbose: true,
});
