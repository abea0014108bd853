import type { Queryable } from '../db/client';
import { newId } from '../ids';
import { insertMessage, type Attachment, type MessageKind } from '../queries/outbox';

export interface MessageDraft {
	/** Null for messages of no shop, such as a password reset. */
	readonly shopId: string | null;
	readonly kind: MessageKind;
	/** One plain address. */
	readonly to: string;
	readonly subject: string;
	/** Plain text; links stand on lines of their own. */
	readonly text: string;
	readonly attachments?: readonly Attachment[];
}

// C0, DEL and C1 controls and the two Unicode line separators: any of them could start a header of its own.
// eslint-disable-next-line no-control-regex
const CONTROL = /[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g;

/** One line of text for a header: whatever breaks a line becomes a space. */
export const oneLine = (text: string): string => text.replace(CONTROL, ' ').trim();

const ADDRESS = /^[^\s@<>()",;:\\[\]]{1,64}@[A-Za-z0-9.-]{1,253}$/;

/** Whether the text is one plain e-mail address that can stand alone in an envelope. */
export const isPlainAddress = (text: string): boolean => ADDRESS.test(text);

/**
 * Puts a message in line inside the caller's transaction, so that it goes out if and only if the change that
 * caused it is committed. Delivery is at least once: a duplicate, with the same Message-ID, is possible only
 * when the server dies between the mail server's acknowledgement and the mark.
 * Returns the message's id.
 */
export function enqueue(tx: Queryable, message: MessageDraft, now: number): string {
	const id = newId();
	insertMessage(
		tx,
		{
			...message,
			id,
			to: oneLine(message.to),
			subject: oneLine(message.subject).slice(0, 200),
			attachments: message.attachments ?? []
		},
		now
	);
	return id;
}
