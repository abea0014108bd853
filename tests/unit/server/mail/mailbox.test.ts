import { createTransport } from 'nodemailer';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { write, type Database } from '$lib/server/db/client';
import { outbox } from '$lib/server/db/schema/mail';
import { users } from '$lib/server/db/schema/people';
import { testDatabase } from '$lib/server/db/testing';
import { openBuiltInMailbox, type BuiltInMailbox } from '$lib/server/mail/built-in-mailbox';
import { enqueue, type MessageDraft } from '$lib/server/mail/outbox';
import { sendNext } from '$lib/server/mail/sender';
import {
	findMailboxAttachment,
	findMailboxMessage,
	listMailbox,
	listMailboxAttachments
} from '$lib/server/queries/mailbox';
import { newId } from '$lib/server/ids';

let db: Database;
let mailbox: BuiltInMailbox;
const NOW = 1_700_000_000_000;

beforeEach(async () => {
	db = await testDatabase();
	mailbox = await openBuiltInMailbox(db);
});
afterEach(() => mailbox.close());

async function send(draft: Partial<MessageDraft>): Promise<string> {
	const message: MessageDraft = {
		shopId: 'shop-a',
		kind: 'order',
		to: 'orders@supplier.test',
		subject: 'Order 1',
		text: 'Grüße',
		...draft
	};
	const id = write(db, (tx) => enqueue(tx, message, NOW));
	const settings = {
		db,
		smtpUrl: `smtp://127.0.0.1:${mailbox.port}`,
		from: 'Shop <shop@lapwing.test>',
		now: () => NOW,
		random: Math.random
	};
	while (await sendNext(settings));
	return id;
}

const PURCHASER = { userId: 'nobody', kinds: ['order'] as const };
const OWNER = { userId: 'nobody', kinds: ['order', 'invitation'] as const };

describe('the built-in mailbox', () => {
	it('keeps what was sent over SMTP: text, and the attachment byte for byte', async () => {
		const content = Buffer.from(Array.from({ length: 5000 }, (_, n) => n % 256));
		const id = await send({
			attachments: [{ filename: 'order "1".xlsx', contentType: 'application/zip', content }]
		});
		const message = findMailboxMessage(db, 'shop-a', PURCHASER, id)!;
		expect(message).toMatchObject({ to: 'orders@supplier.test', subject: 'Order 1' });
		expect(message.text).toContain('Grüße');
		const [attachment] = listMailboxAttachments(db, id);
		expect(attachment).toMatchObject({ filename: 'order "1".xlsx', bytes: 5000 });
		const found = findMailboxAttachment(db, 'shop-a', PURCHASER, {
			messageId: id,
			attachmentId: attachment!.id
		});
		expect(Buffer.compare(found!.content, content)).toBe(0);
		expect(
			findMailboxAttachment(db, 'shop-b', OWNER, { messageId: id, attachmentId: attachment!.id })
		).toBeUndefined();
	});

	it('shows a message that was delivered twice once', async () => {
		const id = await send({});
		db.update(outbox).set({ state: 'waiting' }).run();
		await send({ subject: 'Order 2' });
		const subjects = listMailbox(db, 'shop-a', PURCHASER).map((message) => message.subject);
		expect(subjects.sort()).toEqual(['Order 1', 'Order 2']);
		expect(findMailboxMessage(db, 'shop-a', PURCHASER, id)).toBeDefined();
	});

	it('refuses what this server did not write', async () => {
		const transport = createTransport({ host: '127.0.0.1', port: mailbox.port });
		const stranger = { from: 'a@b.test', to: 'c@d.test', subject: 'Forged', text: '' };
		await expect(
			transport.sendMail({ ...stranger, messageId: `<${newId()}@lapwing.test>` })
		).rejects.toThrow('550');
		await expect(transport.sendMail(stranger)).rejects.toThrow('550');
	});
});

describe('who sees which message', () => {
	it('orders to the purchaser, invitations to the owner too, nothing to another shop', async () => {
		await send({});
		await send({ kind: 'invitation', subject: 'Come in', to: 'new@person.test' });
		const seen = (shop: string, reader: typeof PURCHASER | typeof OWNER) =>
			listMailbox(db, shop, reader)
				.map((message) => message.subject)
				.sort();
		expect(seen('shop-a', PURCHASER)).toEqual(['Order 1']);
		expect(seen('shop-a', OWNER)).toEqual(['Come in', 'Order 1']);
		expect(seen('shop-b', OWNER)).toEqual([]);
	});

	it('a password reset to nobody but the person it is addressed to', async () => {
		const person = (id: string, email: string) =>
			db.insert(users).values({ id, email, name: id, createdAt: NOW }).run();
		person('pat', 'pat@shop.test');
		person('lee', 'lee@shop.test');
		const id = await send({
			shopId: null,
			kind: 'password reset',
			to: 'Lee@shop.test',
			subject: 'Reset'
		});
		const found = (userId: string) =>
			findMailboxMessage(db, 'shop-a', { ...OWNER, userId }, id)?.subject;
		expect(found('pat')).toBeUndefined();
		expect(found('nobody')).toBeUndefined();
		expect(found('lee')).toBe('Reset');
	});
});
