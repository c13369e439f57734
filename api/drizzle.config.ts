import { defineConfig } from 'drizzle-kit';

export default defineConfig({
  dialect: 'postgresql',
  schema: './api/src/database/schema/*.ts',
  out: './drizzle',
});
