import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { write, type Database } from '$lib/server/db/client';
import { outbox } from '$lib/server/db/schema/mail';
import { testDatabase } from '$lib/server/db/testing';
import { enqueue, isPlainAddress, type MessageDraft } from '$lib/server/mail/outbox';
import { isPermanent, MOST_ATTEMPTS, waitMs } from '$lib/server/mail/outcome';
import { LEASE_MS, sendNext, type SenderSettings } from '$lib/server/mail/sender';
import { claimMessage, retryMessage, settleMessage } from '$lib/server/queries/outbox';
import { openFake } from '../../../support/smtp-fake';

const MESSAGE: MessageDraft = {
	shopId: 'shop-a',
	kind: 'order',
	to: 'orders@supplier.test',
	subject: 'Order 7',
	text: 'Twelve lengths.',
	attachments: [
		{ filename: 'order-7.xlsx', contentType: 'application/zip', content: Buffer.from([1, 2, 3]) }
	]
};

let db: Database;
let fake: Awaited<ReturnType<typeof openFake>>;
let clock: number;
let settings: SenderSettings;

beforeEach(async () => {
	db = await testDatabase();
	fake = await openFake();
	clock = 1_000_000;
	settings = {
		db,
		smtpUrl: fake.url,
		from: 'Shop <shop@lapwing.test>',
		now: () => clock,
		random: () => 0.5,
		silenceMs: 300
	};
});
afterEach(() => fake.close());

const put = (draft: MessageDraft = MESSAGE) => write(db, (tx) => enqueue(tx, draft, clock));
const row = () => db.select().from(outbox).get()!;

describe('a message goes out', () => {
	it('once, under a Message-ID that is its own id, with its attachment', async () => {
		const id = put();
		expect(await sendNext(settings)).toBe(true);
		expect(await sendNext(settings)).toBe(false);
		expect(fake.taken).toHaveLength(1);
		expect(fake.taken[0]).toContain(`Message-ID: <${id}@lapwing.test>`);
		expect(fake.taken[0]).toContain('order-7.xlsx');
		expect(row()).toMatchObject({ state: 'sent', attempts: 1, sentAt: clock, token: null });
	});

	it('not at all when the change that caused it is rolled back', async () => {
		expect(() =>
			write(db, (tx) => {
				enqueue(tx, MESSAGE, clock);
				throw new Error('the change failed');
			})
		).toThrow('the change failed');
		expect(await sendNext(settings)).toBe(false);
		expect(fake.taken).toHaveLength(0);
	});

	it('cannot carry headers of its own in a subject or an address', async () => {
		put({ ...MESSAGE, subject: 'Order 7\r\nBcc: thief@elsewhere.test\u2028X: y', attachments: [] });
		await sendNext(settings);
		const head = fake.taken[0]!.split('\r\n\r\n')[0]!;
		expect(head).not.toMatch(/^bcc:/im);
		expect(head).not.toMatch(/^x: y/im);
		expect(head).toContain('Subject: Order 7 Bcc: thief@elsewhere.test X: y');
		for (const bad of ['a@b\r\nBcc: c@d', 'a@b, c@d', '<a@b>', 'a b@c', 'a@', '"x"@y.test'])
			expect(isPlainAddress(bad), bad).toBe(false);
		expect(isPlainAddress('orders+north@supplier.example')).toBe(true);
	});
});

describe('a message that is refused', () => {
	for (const at of ['recipient', 'data'] as const) {
		it(`4xx at ${at}: waits longer each time, is sent when the server takes it`, async () => {
			put();
			fake.behave({ kind: 'answer', code: 451, at });
			await sendNext(settings);
			expect(row()).toMatchObject({ state: 'waiting', attempts: 1, nextAt: clock + 30_000 });
			expect(row().lastError).toContain('451');
			expect(await sendNext(settings)).toBe(false);
			clock += 30_000;
			await sendNext(settings);
			expect(row()).toMatchObject({ state: 'waiting', attempts: 2, nextAt: clock + 60_000 });
			fake.behave({ kind: 'take' });
			clock += 60_000;
			await sendNext(settings);
			expect(row().state).toBe('sent');
			expect(fake.taken).toHaveLength(1);
		});

		it(`5xx at ${at}: is set aside at once, and goes again only when a person says so`, async () => {
			const id = put();
			fake.behave({ kind: 'answer', code: 550, at });
			await sendNext(settings);
			expect(row()).toMatchObject({ state: 'failed', attempts: 1 });
			clock += 10 * 86_400_000;
			expect(await sendNext(settings)).toBe(false);
			fake.behave({ kind: 'take' });
			const again = (shop: string, kinds: readonly ['order'] | readonly ['invitation']) =>
				retryMessage(db, shop, { id, kinds, now: clock });
			expect(again('shop-b', ['order'])).toBe(false);
			expect(again('shop-a', ['invitation'])).toBe(false);
			expect(again('shop-a', ['order'])).toBe(true);
			await sendNext(settings);
			expect(row()).toMatchObject({ state: 'sent', attempts: 1 });
		});
	}

	it('a silent server: the delivery is given up and tried again', async () => {
		put();
		fake.behave({ kind: 'hang' });
		await sendNext(settings);
		expect(row()).toMatchObject({ state: 'waiting', attempts: 1 });
	});

	it('no server at all: waits, and is set aside after the last try', async () => {
		put();
		const nowhere = { ...settings, smtpUrl: 'smtp://127.0.0.1:1' };
		for (let n = 1; n <= MOST_ATTEMPTS; n++) {
			expect(row().state).toBe('waiting');
			clock = row().nextAt;
			await sendNext(nowhere);
			expect(row().attempts).toBe(n);
		}
		expect(row().state).toBe('failed');
	});

	it('waits double from half a minute to six hours, give or take a quarter', () => {
		expect(waitMs(1, () => 0)).toBe(22_500);
		expect(waitMs(1, () => 1)).toBe(37_500);
		expect(waitMs(2, () => 0.5)).toBe(60_000);
		expect(waitMs(30, () => 0.5)).toBe(6 * 3_600_000);
		expect(isPermanent({ responseCode: 421 })).toBe(false);
		expect(isPermanent({ code: 'ECONNECTION' })).toBe(false);
		expect(isPermanent({ code: 'EENVELOPE' })).toBe(true);
	});
});

describe('the server dies', () => {
	const claim = (token: string) =>
		write(db, (tx) => claimMessage(tx, { token, now: clock, until: clock + LEASE_MS }));

	it('after the claim, before the first byte: another sender takes it when the lease is over', async () => {
		put();
		claim('dead');
		expect(await sendNext(settings)).toBe(false);
		clock += LEASE_MS + 1;
		expect(await sendNext(settings)).toBe(true);
		expect(fake.taken).toHaveLength(1);
		expect(row()).toMatchObject({ state: 'sent', attempts: 2 });
	});

	it('after DATA, before the answer: it is sent again under the same Message-ID', async () => {
		const id = put();
		fake.behave({ kind: 'drop' });
		await sendNext(settings);
		expect(row().state).toBe('waiting');
		fake.behave({ kind: 'take' });
		clock = row().nextAt;
		await sendNext(settings);
		expect(row().state).toBe('sent');
		expect(fake.taken).toHaveLength(2);
		for (const message of fake.taken) expect(message).toContain(`<${id}@lapwing.test>`);
	});

	it('between the answer and the mark: the one case of a duplicate, told by its Message-ID', async () => {
		const id = put();
		const dying: SenderSettings = {
			...settings,
			now: () => {
				if (fake.taken.length > 0) throw new Error('killed');
				return clock;
			}
		};
		await expect(sendNext(dying)).rejects.toThrow('killed');
		expect(row().state).toBe('sending');
		clock += LEASE_MS + 1;
		await sendNext(settings);
		expect(row().state).toBe('sent');
		expect(fake.taken.filter((message) => message.includes(`<${id}@`))).toHaveLength(2);
	});

	it('a sender that lost its lease cannot overwrite what the next one wrote', () => {
		put();
		const first = claim('first')!;
		clock += LEASE_MS + 1;
		const second = claim('second')!;
		expect(second.id).toBe(first.id);
		const sent = { state: 'sent' as const, nextAt: clock, error: '', now: clock };
		const late = { state: 'failed' as const, nextAt: clock, error: 'late', now: clock };
		expect(settleMessage(db, { id: first.id, token: 'second' }, sent)).toBe(true);
		expect(settleMessage(db, { id: first.id, token: 'first' }, late)).toBe(false);
		expect(row().state).toBe('sent');
	});

	it('fifty messages and four senders: each is claimed once', () => {
		for (let n = 0; n < 50; n++) put();
		const claimed = Array.from({ length: 60 }, (_, n) => claim(`sender-${n % 4}-${n}`)?.id);
		const ids = claimed.filter((id) => id !== undefined);
		expect(ids).toHaveLength(50);
		expect(new Set(ids).size).toBe(50);
	});
});
