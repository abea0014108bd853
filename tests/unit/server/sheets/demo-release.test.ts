import { beforeAll, describe, expect, it } from 'vitest';
import { INCH, add, ZERO, type Length } from '$lib/domain/lengths/length';
import type { ReleaseSnapshot } from '$lib/domain/plan/snapshot';
import { planDemoJob } from '$lib/server/boot/demo/plan-demo';
import { snapshotsInForce } from '$lib/server/services/mark-fitted';
import { getSiteList, listSiteJobs } from '$lib/server/services/site-list';
import { cutSheetWorkbook } from '$lib/server/sheets/cut-sheet';
import { trimListWorkbook } from '$lib/server/sheets/trim-list';
import { testShop, type TestShop } from '../../../support/demo-shop';
import { readWorkbook, records, sumOf } from '../../../support/read-workbook';

let shop: TestShop;
let snapshot: ReleaseSnapshot;
beforeAll(async () => {
	shop = await testShop();
	await planDemoJob(shop.as('shop lead'), shop.jobId);
	[snapshot] = snapshotsInForce(shop.db, shop.staff.shopId, shop.jobId) as [ReleaseSnapshot];
}, 240_000);

const inches = (of: readonly Length[]) => add(ZERO, ...of) / INCH;

describe('the demo job, planned and released', () => {
	it('has cut sheets on which usable metal is pieces, losses and what is left', async () => {
		const book = await readWorkbook(await cutSheetWorkbook(snapshot));
		for (const [index, group] of snapshot.groups.entries()) {
			const rows = records(book.worksheets[index]!);
			rows.pop();
			const usable = inches(group.sticks.map((stick) => stick.usable));
			const uses = ['Length, in', 'Kerf and squaring, in', 'Left over, in'];
			expect(sumOf(rows, 'Usable, in')).toBeCloseTo(usable, 6);
			expect(uses.reduce((sum, name) => sum + sumOf(rows, name), 0)).toBeCloseTo(usable, 6);
			for (const stick of rows) expect(Number(stick['Length, in'] ?? 1)).toBeGreaterThan(0);
		}
	});

	it('has one line on a trim list for every piece cut, and no other', async () => {
		const book = await readWorkbook(await trimListWorkbook(snapshot));
		const lists = book.worksheets
			.slice(0, snapshot.elevations.length)
			.map((sheet) => records(sheet));
		const marks = lists.flatMap((rows) => rows.slice(0, -1).map((row) => String(row['Mark'])));
		const cut = snapshot.groups
			.flatMap((group) => group.sticks.flatMap((stick) => stick.cuts.map((each) => each.mark)))
			.sort();
		expect([...marks].sort()).toEqual(cut);
	});

	it('reaches the phone with every released piece and every run on hold', () => {
		const [job] = listSiteJobs(shop.as('installer'));
		const lists = job!.elevations.map((elevation) =>
			getSiteList(shop.as('installer'), job!.id, elevation.id)!
		);
		const pieces = lists.flatMap((list) => list.trim?.runs.flatMap((run) => run.pieces) ?? []);
		expect(pieces).toHaveLength(
			snapshot.groups.flatMap((group) => group.sticks.flatMap((stick) => stick.cuts)).length
		);
		const held = lists.flatMap((list) => list.held.map((run) => run.mark)).sort();
		expect(held).toEqual(snapshot.leftOut.map((out) => out.mark).sort());
		expect(JSON.stringify(lists)).not.toMatch(/cents|price|customer/i);
	});
});
