import { and, asc, desc, eq, inArray, lt, lte, or, sql } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { outbox, outboxAttachments } from '../db/schema/mail';
import { newId } from '../ids';

export type OutboxRow = typeof outbox.$inferSelect;
export type MessageKind = OutboxRow['kind'];

export interface Attachment {
	readonly filename: string;
	readonly contentType: string;
	readonly content: Uint8Array;
}

export interface NewMessage {
	readonly id: string;
	readonly shopId: string | null;
	readonly kind: MessageKind;
	readonly to: string;
	readonly subject: string;
	readonly text: string;
	readonly attachments: readonly Attachment[];
}

/** Writes a waiting message and its attachments; call it inside the transaction of what caused it. */
export function insertMessage(tx: Queryable, message: NewMessage, now: number): void {
	const { attachments, ...row } = message;
	tx.insert(outbox)
		.values({ ...row, nextAt: now, createdAt: now })
		.run();
	for (const attachment of attachments)
		tx.insert(outboxAttachments)
			.values({
				...attachment,
				id: newId(),
				outboxId: message.id,
				content: Buffer.from(attachment.content)
			})
			.run();
}

/**
 * Takes the next message that is due, or one whose sender went silent, under a fresh token and lease.
 * One statement: two senders never take the same message.
 */
export function claimMessage(
	db: Queryable,
	lease: { readonly token: string; readonly now: number; readonly until: number }
): OutboxRow | undefined {
	const due = db
		.select({ id: outbox.id })
		.from(outbox)
		.where(
			or(
				and(eq(outbox.state, 'waiting'), lte(outbox.nextAt, lease.now)),
				and(eq(outbox.state, 'sending'), lt(outbox.leaseUntil, lease.now))
			)
		)
		.orderBy(asc(outbox.nextAt))
		.limit(1);
	return db
		.update(outbox)
		.set({
			state: 'sending',
			token: lease.token,
			leaseUntil: lease.until,
			attempts: sql`${outbox.attempts} + 1`
		})
		.where(inArray(outbox.id, due))
		.returning()
		.get();
}

export interface SendOutcome {
	readonly state: 'sent' | 'waiting' | 'failed';
	/** When to try again; ignored unless waiting. */
	readonly nextAt: number;
	readonly error: string;
	readonly now: number;
}

/** Records how a claimed message fared; false when the lease was lost to another sender meanwhile. */
export function settleMessage(
	db: Queryable,
	claim: { readonly id: string; readonly token: string },
	outcome: SendOutcome
): boolean {
	const done = db
		.update(outbox)
		.set({
			state: outcome.state,
			nextAt: outcome.nextAt,
			lastError: outcome.error,
			token: null,
			leaseUntil: null,
			sentAt: outcome.state === 'sent' ? outcome.now : null
		})
		.where(and(eq(outbox.id, claim.id), eq(outbox.token, claim.token), eq(outbox.state, 'sending')))
		.run();
	return done.changes === 1;
}

export const listAttachments = (db: Queryable, outboxId: string) =>
	db
		.select({
			filename: outboxAttachments.filename,
			contentType: outboxAttachments.contentType,
			content: outboxAttachments.content
		})
		.from(outboxAttachments)
		.where(eq(outboxAttachments.outboxId, outboxId))
		.all();

/** Where a message came from; undefined for one that this server never wrote. */
export const findMessageSource = (db: Queryable, id: string) =>
	db
		.select({ shopId: outbox.shopId, kind: outbox.kind })
		.from(outbox)
		.where(eq(outbox.id, id))
		.get();

const SHOWN = {
	id: outbox.id,
	kind: outbox.kind,
	to: outbox.to,
	subject: outbox.subject,
	state: outbox.state,
	attempts: outbox.attempts,
	nextAt: outbox.nextAt,
	lastError: outbox.lastError,
	sentAt: outbox.sentAt
};

/** How one message of the shop fares: what an order's page shows. */
export const findMessageState = (db: Queryable, shopId: string, id: string) =>
	db
		.select(SHOWN)
		.from(outbox)
		.where(and(eq(outbox.shopId, shopId), eq(outbox.id, id)))
		.get();

/** The shop's messages that have not gone out, newest first. */
export const listUnsent = (db: Queryable, shopId: string, kinds: readonly MessageKind[]) =>
	db
		.select(SHOWN)
		.from(outbox)
		.where(
			and(
				eq(outbox.shopId, shopId),
				inArray(outbox.kind, [...kinds]),
				inArray(outbox.state, ['waiting', 'sending', 'failed'])
			)
		)
		.orderBy(desc(outbox.createdAt))
		.limit(200)
		.all();

/** Puts a failed message of the shop back in line with a fresh count; false when it is not a failed one. */
export function retryMessage(
	db: Queryable,
	shopId: string,
	message: { readonly id: string; readonly kinds: readonly MessageKind[]; readonly now: number }
): boolean {
	const done = db
		.update(outbox)
		.set({ state: 'waiting', attempts: 0, nextAt: message.now })
		.where(
			and(
				eq(outbox.id, message.id),
				eq(outbox.shopId, shopId),
				eq(outbox.state, 'failed'),
				inArray(outbox.kind, [...message.kinds])
			)
		)
		.run();
	return done.changes === 1;
}
