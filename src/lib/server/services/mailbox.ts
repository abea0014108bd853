import { config } from '../config';
import type { Context } from '../context';
import { write } from '../db/client';
import { appendHistory } from '../queries/history';
import {
	findMailboxAttachment,
	findMailboxMessage,
	listMailbox,
	listMailboxAttachments,
	type Reader
} from '../queries/mailbox';
import { listUnsent, retryMessage, type MessageKind } from '../queries/outbox';

/** Orders are the purchaser's; an invitation carries a key to the shop and is the owner's alone. */
const readerOf = (ctx: Context): Reader & { kinds: readonly MessageKind[] } => ({
	userId: ctx.userId,
	kinds: ctx.permissions.has('people.manage') ? ['order', 'invitation'] : ['order']
});

/** What the built-in mailbox holds for the reader, and what of the shop has not gone out. */
export function readMailbox(ctx: Context) {
	const reader = readerOf(ctx);
	return {
		builtIn: config.smtpUrl === '',
		messages: listMailbox(ctx.db, ctx.shopId, reader),
		unsent: listUnsent(ctx.db, ctx.shopId, reader.kinds)
	};
}

/** One message with its attachments; undefined when the reader may not see such a one. */
export function readMessage(ctx: Context, id: string) {
	const message = findMailboxMessage(ctx.db, ctx.shopId, readerOf(ctx), id);
	return message && { message, attachments: listMailboxAttachments(ctx.db, id) };
}

export const readAttachment = (ctx: Context, messageId: string, attachmentId: string) =>
	findMailboxAttachment(ctx.db, ctx.shopId, readerOf(ctx), { messageId, attachmentId });

/** Puts a failed message back in line; false when there is none such to retry. */
export function retryMail(ctx: Context, id: string): boolean {
	const { kinds } = readerOf(ctx);
	return write(ctx.db, (tx) => {
		const again = retryMessage(tx, ctx.shopId, { id, kinds, now: ctx.now });
		if (again)
			appendHistory(tx, ctx, {
				action: 'tried again',
				entity: 'message',
				entityId: id,
				summary: 'A message that had failed was put back in line.'
			});
		return again;
	});
}
