import type { Queryable } from '../db/client';
import { newId } from '../ids';
import { insertOutbox } from '../queries/outbox';

/** A message to send; `shopId` is null for one that belongs to no shop, such as a password reset. */
export interface Message {
	readonly shopId: string | null;
	readonly kind: 'order' | 'invitation' | 'password reset';
	readonly to: string;
	readonly subject: string;
	readonly text: string;
	readonly attachments?: readonly {
		readonly filename: string;
		readonly contentType: string;
		readonly content: Uint8Array;
	}[];
}

/**
 * Puts a message into the outbox; call it inside the transaction of the change that causes it, so that there is
 * never a change without its message nor a message without its change. Returns the id, also the Message-ID.
 */
export function enqueue(tx: Queryable, message: Message, now: number): string {
	const id = newId();
	insertOutbox(tx, id, message, now);
	return id;
}
