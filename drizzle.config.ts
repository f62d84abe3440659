import { defineConfig } from 'drizzle-kit';

export default defineConfig({
	dialect: 'turso',
	schema: './src/lib/server/db/schema/*.ts',
	out: './drizzle',
	dbCredentials: { url: 'file:./data/ropewalk.db' },
	strict: true
});
