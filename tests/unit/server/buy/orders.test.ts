import ExcelJS from 'exceljs';
import { beforeEach, describe, expect, it } from 'vitest';
import { feet, inches, length } from '../../../../src/lib/domain/lengths/length';
import type { Context } from '../../../../src/lib/server/context';
import { ledger, metal } from '../../../../src/lib/server/db/schema/metal';
import { outbox, outboxAttachments } from '../../../../src/lib/server/db/schema/mail';
import { orders } from '../../../../src/lib/server/db/schema/orders';
import { history } from '../../../../src/lib/server/db/schema/people';
import { testDatabase } from '../../../../src/lib/server/db/testing';
import { newId } from '../../../../src/lib/server/ids';
import { editOrder } from '../../../../src/lib/server/services/orders/edit-order';
import { cancelOrder, closeShort } from '../../../../src/lib/server/services/orders/end-order';
import { listNeeds } from '../../../../src/lib/server/services/orders/list-needs';
import { makeOrders } from '../../../../src/lib/server/services/orders/make-orders';
import { orderPaper } from '../../../../src/lib/server/services/orders/order-paper';
import { readOrder, readOrders } from '../../../../src/lib/server/services/orders/read-order';
import { receiveOrder } from '../../../../src/lib/server/services/orders/receive-order';
import { resendOrder, sendOrder } from '../../../../src/lib/server/services/orders/send-order';
import { addShop } from '../catalog/shop';
import { addBench, addJob, addRelease, type Bench } from './bench';

let ours: Context;
let theirs: Context;
let bench: Bench;

beforeEach(async () => {
	const db = await testDatabase();
	ours = addShop(db, 'Ours', ['purchaser']);
	theirs = addShop(db, 'Theirs', ['purchaser']);
	bench = addBench(ours);
	addRelease(ours, bench, addJob(ours), {
		kind: 'buy',
		stock: { [bench.ten]: 12, [bench.twelve]: 3 },
		marginPercent: 10
	});
});

const want = (stockLengthId: string, quantity: number, spares = 0, spareReason = '') => ({
	stockLengthId,
	quantity,
	spares,
	spareReason
});

function make(lines = [want(bench.ten, 14, 2, 'damage allowance'), want(bench.twelve, 4)]): string {
	const made = makeOrders(ours, { lines });
	if (made.kind !== 'done') throw new Error(JSON.stringify(made));
	return made.value[0]!.id;
}
const view = (id: string) => readOrder(ours, id)!;
const edit = (id: string, over: object = {}) => {
	const { order, lines, money } = view(id);
	return editOrder(ours, id, {
		version: order.version,
		needBy: order.needBy,
		deliverTo: order.deliverTo,
		note: order.note,
		freightCents: money!.freightCents,
		lines: lines.map((line) => ({
			id: line.id,
			quantity: line.quantity,
			unitPriceCents: line.unitPriceCents!,
			purpose: line.purpose
		})),
		...over
	});
};
const sent = async (): Promise<string> => {
	const id = make();
	await sendOrder(ours, id, 1);
	return id;
};

describe('an order is made', () => {
	it('with a line for the jobs and a line for spares with their reason, priced as sold', () => {
		const { lines, money, order } = view(make());
		expect(
			lines.map((line) => [line.nominalNm, line.quantity, line.lineCents, line.purpose])
		).toEqual([
			[feet(10), 14, 11_000 + 4 * 1160, expect.stringMatching(/^26-\d+ plan 1 incl\. 2 spare/)],
			[feet(10), 2, 2320, 'Spare: damage allowance'],
			[feet(12), 4, 5700, expect.stringMatching(/plan 1 incl\. 1 spare/)]
		]);
		expect(money).toMatchObject({ goodsCents: 23_660, freightCents: 8500, totalCents: 32_160 });
		expect(order).toMatchObject({ number: 1, state: 'draft', needBy: '2026-04-01', version: 1 });
		expect(view(make()).order.number).toBe(2);
	});

	it('one for each supplier, all or none', () => {
		const other = addBench(ours, { code: 'HF' });
		const made = makeOrders(ours, { lines: [want(bench.ten, 1), want(other.ten, 1)] });
		expect(made.kind === 'done' && made.value.map((one) => one.number)).toEqual([1, 2]);
	});

	it('never from nothing, from another shop, or with spares without a reason', () => {
		const foreign = addBench(theirs);
		for (const lines of [[want(bench.ten, 0)], [want(foreign.ten, 3)], [want(bench.ten, 1, 2)]])
			expect(makeOrders(ours, { lines }).kind).toBe('refused');
		expect(readOrders(ours)).toEqual([]);
	});
});

describe('a draft is edited', () => {
	it('quantities, prices, lines taken off, need-by, place and freight', () => {
		const id = make();
		const [first, second, third] = view(id).lines;
		const line = (of: typeof first, quantity: number, unitPriceCents: number) => ({
			id: of!.id,
			quantity,
			unitPriceCents,
			purpose: of!.purpose
		});
		const lines = [line(first, 20, 1160), line(second, 0, 1160), line(third, 4, 1400)];
		expect(edit(id, { lines, freightCents: 0, needBy: null, note: 'Bay 2' }).kind).toBe('done');
		expect(view(id)).toMatchObject({
			order: { version: 2, needBy: null, note: 'Bay 2' },
			money: { goodsCents: 22_000 + 5600, freightCents: 0 },
			lines: [
				{ quantity: 20, bundles: 2 },
				{ quantity: 4, lineCents: 5600 }
			]
		});
	});

	it('not over what somebody else saved: both versions are there', () => {
		const id = make();
		edit(id, { note: 'first' });
		const second = edit(id, { note: 'second', version: 1 });
		expect(second).toMatchObject({ kind: 'conflict', theirs: { order: { note: 'first' } } });
		expect(view(id).order.note).toBe('first');
	});

	it('not by another shop, not after it was sent', async () => {
		const id = await sent();
		expect(edit(id).kind).toBe('refused');
		expect(readOrder(theirs, id)).toBeUndefined();
		expect(cancelOrder(theirs, id, 2).kind).toBe('missing');
		expect((await sendOrder(theirs, id, 2)).kind).toBe('missing');
	});
});

describe('an order is sent', () => {
	it('with message, state and history at once: text with colour codes, and the spreadsheet', async () => {
		const id = await sent();
		expect(view(id)).toMatchObject({
			order: { state: 'sent', version: 2 },
			message: { state: 'waiting', to: 'orders@ostler.test', subject: 'Order 1 from Ours' }
		});
		const text = ours.db.select().from(outbox).get()!.text;
		expect(text).toContain(`14 lengths of DE Drip edge, 10'-0" (usable 9'-11"), girth 2"`);
		expect(text).toContain('colour code SG-31');
		// The sum of a line can be worked out from what stands on it: 110.00 + 4 × 11.60.
		expect(text).toContain('1 × bundle of 10 at $110.00, 4 at $11.60 each: $156.40');
		expect(text).toContain('Goods $236.60, freight $85.00, total $321.60');
		const file = ours.db.select().from(outboxAttachments).get()!;
		const book = new ExcelJS.Workbook();
		await book.xlsx.load(file.content as never);
		const numbers = book.worksheets[0]!.getSheetValues()
			.flatMap((row) => (Array.isArray(row) ? row : []))
			.filter((cell): cell is number => typeof cell === 'number');
		for (const wanted of [14, 2, 4, 11.6, 156.4, 23.2, 57, 85]) expect(numbers).toContain(wanted);
		expect(file.filename).toBe('order-1.xlsx');
		const told = ours.db.select().from(history).all();
		expect(told.map((one) => one.action)).toEqual(['made', 'sent']);
	});

	it('once, however often and however fast it is clicked', async () => {
		const id = make();
		const clicks = await Promise.all([1, 2, 3, 4].map(() => sendOrder(ours, id, 1)));
		expect(clicks.map((one) => one.kind)).toEqual(['done', 'done', 'done', 'done']);
		expect(clicks.filter((one) => one.kind === 'done' && !one.value.before)).toHaveLength(1);
		expect(ours.db.select().from(outbox).all()).toHaveLength(1);
	});

	it('never in a version that the purchaser did not review', async () => {
		const id = make();
		edit(id, { note: 'changed meanwhile' });
		expect((await sendOrder(ours, id, 1)).kind).toBe('conflict');
		expect(ours.db.select().from(outbox).all()).toEqual([]);
	});

	it('never to something that is not one address, and never empty', async () => {
		ours.db.$client.exec(`update suppliers set email = 'a@b.test, c@d.test'`);
		const id = make();
		const refusedAddress = await sendOrder(ours, id, 1);
		expect(refusedAddress).toMatchObject({ kind: 'refused', problems: [{ field: 'supplier' }] });
		ours.db.$client.exec(`update suppliers set email = 'a@b.test'`);
		edit(id, { lines: view(id).lines.map((l) => ({ ...l, quantity: 0, unitPriceCents: 1 })) });
		expect(await sendOrder(ours, id, 2)).toMatchObject({ problems: [{ field: 'lines' }] });
	});

	it('again only on purpose, and says so; a cancelled one tells the supplier', async () => {
		const id = await sent();
		await resendOrder(ours, id, 2);
		expect(cancelOrder(ours, id, 3).kind).toBe('done');
		const subjects = ours.db.select({ subject: outbox.subject }).from(outbox).all();
		expect(subjects.map((one) => one.subject)).toEqual([
			'Order 1 from Ours',
			'Order 1 from Ours (sent again)',
			'Order 1 from Ours is cancelled'
		]);
		expect((await resendOrder(ours, id, 4)).kind).toBe('refused');
	});

	it('cannot be made to carry a formula or a header of its own', async () => {
		ours.db.$client.exec(`update materials set colour_name = '=1+1'`);
		ours.db.$client.exec(`update suppliers set name = 'Ostler' || char(13, 10) || 'Bcc: x@y.test'`);
		const id = make();
		await sendOrder(ours, id, 1);
		expect(ours.db.select().from(outbox).get()!.subject).not.toMatch(/[\r\n]/);
		const book = new ExcelJS.Workbook();
		await book.xlsx.load((await orderPaper(ours, id)!.workbook()) as never);
		const cells: unknown[] = [];
		book.worksheets[0]!.eachRow((row) => row.eachCell((cell) => cells.push(cell.value)));
		const colour = cells.filter((value) => JSON.stringify(value).includes('1+1'));
		expect(colour.length).toBeGreaterThan(0);
		for (const value of colour) expect(typeof value).toBe('string');
	});
});

describe('a delivery is recorded', () => {
	const arrived = (id: string, over: object[] = []) => ({
		opId: newId(),
		note: '',
		lines: view(id).lines.map((line, index) => ({
			orderLineId: line.id,
			received: line.quantity,
			damaged: 0,
			batch: 'L-31',
			actualNm: line.nominalNm as number,
			place: 'Bay 2',
			...over[index]
		}))
	});
	const sticks = () => ours.db.select().from(metal).all();

	it('every length in good order is on hand with a label, a batch and both lengths', async () => {
		const id = await sent();
		const received = receiveOrder(ours, id, arrived(id));
		expect(received).toMatchObject({
			kind: 'done',
			value: { state: 'received', shortBy: 0, over: 0 }
		});
		expect(sticks()).toHaveLength(20);
		expect(sticks()[0]).toMatchObject({
			kind: 'stick',
			label: 'S-1',
			batch: 'L-31',
			actualNm: feet(10),
			usableNm: length(feet(10) - inches(1)),
			stockLengthId: bench.ten,
			place: 'Bay 2'
		});
		expect(new Set(sticks().map((one) => one.label)).size).toBe(20);
		const need = listNeeds(ours).suppliers[0]!.rows[0]!.need;
		expect(need).toMatchObject({ required: 14, onHand: 16, onOrder: 0, toBuy: 0, surplus: 2 });
	});

	it('short and damaged lengths stay awaited; the same act sent twice is recorded once', async () => {
		const id = await sent();
		const delivery = arrived(id, [{ received: 10, damaged: 1 }, { received: 0 }, { received: 6 }]);
		const first = receiveOrder(ours, id, delivery);
		expect(first).toMatchObject({ value: { state: 'part received', shortBy: 7, over: 2 } });
		expect(receiveOrder(ours, id, delivery)).toMatchObject({ value: { labels: [], shortBy: 7 } });
		expect(sticks()).toHaveLength(15);
		expect(view(id).lines.map((line) => [line.good, line.open])).toEqual([
			[9, 5],
			[0, 2],
			[6, 0]
		]);
		expect(listNeeds(ours).suppliers[0]!.rows[0]!.need).toMatchObject({ onHand: 9, onOrder: 7 });
		expect(closeShort(ours, id, view(id).order.version).kind).toBe('done');
		expect(listNeeds(ours).suppliers[0]!.rows[0]!.need).toMatchObject({ onOrder: 0, toBuy: 5 });
	});

	it('twelve feet instead of ten are kept as twelve; over-length is not usable', async () => {
		const id = await sent();
		const delivery = arrived(id, [
			{ received: 3, actualNm: feet(12) },
			{ received: 1, actualNm: length(feet(10) + inches(2)) },
			{ received: 1, actualNm: length(feet(12) - inches(2)) }
		]);
		receiveOrder(ours, id, delivery);
		const kept = sticks().map((one) => [one.stockLengthId, one.actualNm, one.usableNm]);
		const twelve = [bench.twelve, feet(12), feet(12) - inches(1)];
		expect(kept).toEqual([
			twelve,
			twelve,
			twelve,
			[bench.ten, feet(10) + inches(2), feet(10) - inches(1)],
			[bench.twelve, feet(12) - inches(2), feet(12) - inches(3)]
		]);
	});

	it('balances the ledger: what came in lies unused or went back', async () => {
		const id = await sent();
		receiveOrder(ours, id, arrived(id, [{ received: 5, damaged: 2 }, { received: 0 }]));
		const sums = new Map<string, number>();
		for (const entry of ours.db.select().from(ledger).all())
			sums.set(entry.account, (sums.get(entry.account) ?? 0) + entry.lengthNm);
		expect(Object.fromEntries(sums)).toEqual({
			'new metal': 5 * feet(10) + 4 * feet(12),
			'spare and unused lengths': 3 * feet(10) + 4 * feet(12),
			'returned to supplier': 2 * feet(10)
		});
	});

	it('not on a draft, not on a line of another order, not of nothing, not of a useless length', async () => {
		const draft = make();
		expect(receiveOrder(ours, draft, arrived(draft)).kind).toBe('refused');
		const id = await sent();
		const one = arrived(id);
		const refusals = [
			{ ...one, lines: [{ ...one.lines[0]!, orderLineId: newId() }] },
			{ ...one, lines: one.lines.map((line) => ({ ...line, received: 0 })) },
			{ ...one, lines: [one.lines[0]!, one.lines[0]!] },
			{ ...one, lines: [{ ...one.lines[0]!, actualNm: inches(1) as number }] }
		];
		for (const input of refusals) expect(receiveOrder(ours, id, input).kind).toBe('refused');
		expect(receiveOrder(theirs, id, one).kind).toBe('missing');
		expect(sticks()).toEqual([]);
		expect(ours.db.select().from(orders).all().length).toBe(2);
	});
});
