import { closeDatabase, getDatabase } from '../db/client';
import { migrateDatabase } from '../db/migrate';
import { seedDemo } from './seed-demo';

/** Before the server starts: migrate, check the file, seed the demo when the database is new. */
async function main(): Promise<void> {
	const db = getDatabase();
	await migrateDatabase(db);
	const sound = db.$client.pragma('quick_check', { simple: true });
	if (sound !== 'ok') throw new Error(`the database file is damaged: ${String(sound)}`);
	await seedDemo(db);
	closeDatabase();
}

main().catch((cause: unknown) => {
	console.error(cause);
	process.exitCode = 1;
});
