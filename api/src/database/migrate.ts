import { migrateDatabase } from './migrations.js';

const url = process.env.DATABASE_URL;
if (!url) {
  console.error('DATABASE_URL is missing: it names the database to migrate.');
  process.exit(1);
}
const { applied } = await migrateDatabase(url);
console.log(`Database schema is current (${applied} migrations).`);
