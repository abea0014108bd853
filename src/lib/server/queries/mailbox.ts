import { and, desc, eq, inArray, or, sql, type SQL } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { mailbox, mailboxAttachments, outbox } from '../db/schema/mail';
import { users } from '../db/schema/people';
import { newId } from '../ids';
import type { Attachment, MessageKind } from './outbox';

export interface ArrivedMessage {
	/** The outbox message it came from: one row per message however often it was delivered. */
	readonly id: string;
	readonly shopId: string | null;
	readonly messageId: string;
	readonly from: string;
	readonly to: string;
	readonly subject: string;
	readonly text: string;
	readonly attachments: readonly Attachment[];
}

/** Keeps a message that arrived; a second delivery of the same one changes nothing. */
export function keepMessage(tx: Queryable, message: ArrivedMessage, now: number): void {
	const { attachments, ...row } = message;
	const kept = tx
		.insert(mailbox)
		.values({ ...row, receivedAt: now })
		.onConflictDoNothing()
		.run();
	if (kept.changes === 0) return;
	for (const attachment of attachments)
		tx.insert(mailboxAttachments)
			.values({
				...attachment,
				id: newId(),
				mailboxId: message.id,
				content: Buffer.from(attachment.content)
			})
			.run();
}

/** Who looks: the kinds of the shop's messages they may read, and their own address. */
export interface Reader {
	readonly userId: string;
	readonly kinds: readonly MessageKind[];
}

/**
 * The shop's messages of the reader's kinds, and whatever is addressed to the reader. An invitation or a
 * password reset carries a key to somebody's account: it is never shown to another person by their role alone.
 */
const visible = (shopId: string, reader: Reader): SQL =>
	or(
		and(eq(mailbox.shopId, shopId), inArray(outbox.kind, [...reader.kinds])),
		sql`lower(${mailbox.to}) = (select ${users.email} from ${users} where ${users.id} = ${reader.userId})`
	)!;

export const listMailbox = (db: Queryable, shopId: string, reader: Reader, limit = 200) =>
	db
		.select({
			id: mailbox.id,
			to: mailbox.to,
			subject: mailbox.subject,
			receivedAt: mailbox.receivedAt,
			attachments: sql<number>`(select count(*) from ${mailboxAttachments} where ${mailboxAttachments.mailboxId} = ${mailbox.id})`
		})
		.from(mailbox)
		.innerJoin(outbox, eq(outbox.id, mailbox.id))
		.where(visible(shopId, reader))
		.orderBy(desc(mailbox.receivedAt))
		.limit(limit)
		.all();

export const findMailboxMessage = (db: Queryable, shopId: string, reader: Reader, id: string) =>
	db
		.select({
			id: mailbox.id,
			messageId: mailbox.messageId,
			from: mailbox.from,
			to: mailbox.to,
			subject: mailbox.subject,
			text: mailbox.text,
			receivedAt: mailbox.receivedAt
		})
		.from(mailbox)
		.innerJoin(outbox, eq(outbox.id, mailbox.id))
		.where(and(eq(mailbox.id, id), visible(shopId, reader)))
		.get();

export const listMailboxAttachments = (db: Queryable, mailboxId: string) =>
	db
		.select({
			id: mailboxAttachments.id,
			filename: mailboxAttachments.filename,
			contentType: mailboxAttachments.contentType,
			bytes: sql<number>`length(${mailboxAttachments.content})`
		})
		.from(mailboxAttachments)
		.where(eq(mailboxAttachments.mailboxId, mailboxId))
		.all();

export const findMailboxAttachment = (
	db: Queryable,
	shopId: string,
	reader: Reader,
	at: { readonly messageId: string; readonly attachmentId: string }
) =>
	db
		.select({
			filename: mailboxAttachments.filename,
			contentType: mailboxAttachments.contentType,
			content: mailboxAttachments.content
		})
		.from(mailboxAttachments)
		.innerJoin(mailbox, eq(mailbox.id, mailboxAttachments.mailboxId))
		.innerJoin(outbox, eq(outbox.id, mailbox.id))
		.where(
			and(
				eq(mailboxAttachments.id, at.attachmentId),
				eq(mailbox.id, at.messageId),
				visible(shopId, reader)
			)
		)
		.get();
