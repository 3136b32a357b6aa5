import { defineConfig } from 'drizzle-kit';

export default defineConfig({
  dialect: 'sqlite',
  schema: './drizzle/dist/schema/index.js',
  out: './drizzle/migrations',
});
