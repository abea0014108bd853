import { randomBytes } from 'node:crypto';
import { writeFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { hashPassword } from '../auth/password';
import { permissionsOf } from '../auth/permissions';
import { config } from '../config';
import type { Context } from '../context';
import { write, type Database } from '../db/client';
import { newId } from '../ids';
import { appendHistory } from '../queries/history';
import { hasShop, insertRows } from '../queries/seed';
import { seedCatalog } from './demo/seed-catalog';
import { seedJob } from './demo/seed-job';
import { planDemoJob } from './demo/plan-demo';
import { seedPeople, type DemoStaff } from './demo/seed-people';

/**
 * Seeds the demo shop once, when the database holds no shop: people, catalog, rack, one job of four
 * elevations and sixty runs, planned and released. The password is made here and told on every start.
 */
export async function seedDemo(db: Database, now = Date.now()): Promise<void> {
	if (hasShop(db)) return;
	const password = process.env.LAPWING_DEMO_PASSWORD ?? randomBytes(9).toString('base64url');
	const passwordHash = await hashPassword(password);
	const seeded = write(db, (tx) => {
		const staff = seedPeople(tx, passwordHash, now);
		const catalog = seedCatalog(tx, staff, now);
		const jobId = seedJob(tx, staff, catalog, now);
		insertRows(tx, 'marks', [{ key: 'demo', at: now, demo: true }]);
		appendHistory(
			tx,
			{ shopId: staff.shopId, userId: null, requestId: '', now },
			{
				action: 'seeded',
				entity: 'shop',
				entityId: staff.shopId,
				summary: 'The demo shop was set up.'
			}
		);
		return { staff, jobId };
	});
	tellSignIns(password, seeded.staff);
	await planDemoJob(contextOf(db, seeded.staff, now), seeded.jobId);
}

/** What `npm start` prints; readable by its owner only. */
function tellSignIns(password: string, staff: DemoStaff): void {
	const people = staff.people.map(({ name, email, roles }) => ({ name, email, roles }));
	writeFileSync(
		resolve(config.dataFolder, 'demo-sign-ins.json'),
		JSON.stringify({ password, people }, null, '\t'),
		{ mode: 0o600 }
	);
}

/** The shop lead plans and releases the demo job. */
function contextOf(db: Database, staff: DemoStaff, now: number): Context {
	const lead = staff.byRole['shop lead'];
	return {
		db,
		shopId: staff.shopId,
		shopName: staff.shopName,
		userId: lead.id,
		userName: lead.name,
		roles: lead.roles,
		permissions: permissionsOf(lead.roles),
		requestId: newId(),
		now
	};
}
