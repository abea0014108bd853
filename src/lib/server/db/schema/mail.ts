import { blob, index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { createdAt, idColumn, timeColumn } from '../columns';

/** A message waiting to go out, written in the same transaction as what caused it. */
export const outbox = sqliteTable(
	'outbox',
	{
		/** Also the stable Message-ID. */
		id: idColumn(),
		/** Null for messages of no shop (a password reset). */
		shopId: text('shop_id'),
		kind: text('kind', { enum: ['order', 'invitation', 'password reset'] }).notNull(),
		to: text('to').notNull(),
		subject: text('subject').notNull(),
		text: text('text').notNull(),
		state: text('state', { enum: ['waiting', 'sending', 'sent', 'failed'] })
			.notNull()
			.default('waiting'),
		attempts: integer('attempts').notNull().default(0),
		nextAt: integer('next_at').notNull(),
		token: text('token'),
		leaseUntil: timeColumn('lease_until'),
		lastError: text('last_error').notNull().default(''),
		createdAt: createdAt(),
		sentAt: timeColumn('sent_at')
	},
	(t) => [index('outbox_next').on(t.state, t.nextAt)]
);

export const outboxAttachments = sqliteTable('outbox_attachments', {
	id: idColumn(),
	outboxId: text('outbox_id')
		.notNull()
		.references(() => outbox.id),
	filename: text('filename').notNull(),
	contentType: text('content_type').notNull(),
	content: blob('content', { mode: 'buffer' }).notNull()
});

/** What the built-in mailbox received over SMTP when no mail server is configured. */
export const mailbox = sqliteTable('mailbox', {
	id: idColumn(),
	/** Taken from the outbox row it came from; null for messages of no shop. */
	shopId: text('shop_id'),
	messageId: text('message_id').notNull().unique(),
	from: text('from').notNull(),
	to: text('to').notNull(),
	subject: text('subject').notNull(),
	text: text('text').notNull(),
	receivedAt: integer('received_at').notNull()
});

export const mailboxAttachments = sqliteTable('mailbox_attachments', {
	id: idColumn(),
	mailboxId: text('mailbox_id')
		.notNull()
		.references(() => mailbox.id),
	filename: text('filename').notNull(),
	contentType: text('content_type').notNull(),
	content: blob('content', { mode: 'buffer' }).notNull()
});
