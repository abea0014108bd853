import { createTransport } from 'nodemailer';
import { write, type Database } from '../db/client';
import { newId } from '../ids';
import { log } from '../log';
import { claimMessage, listAttachments, settleMessage, type OutboxRow } from '../queries/outbox';
import { outcomeOfFailure } from './outcome';

/** Longer than one delivery may take, so that a live sender never loses its claim. */
export const LEASE_MS = 180_000;
const DELIVERY_MS = 120_000;

export interface SenderSettings {
	readonly db: Database;
	readonly smtpUrl: string;
	readonly from: string;
	readonly now: () => number;
	readonly random: () => number;
	/** Silence on the wire after which a delivery is given up. */
	readonly silenceMs?: number;
}

/** The stable Message-ID: a second delivery of the same message can be told by it. */
export function messageIdOf(id: string, from: string): string {
	const host = /@([A-Za-z0-9.-]+)/.exec(from)?.[1] ?? 'localhost';
	return `<${id}@${host}>`;
}

function withDeadline<T>(work: Promise<T>, ms: number): Promise<T> {
	let timer: NodeJS.Timeout;
	const late = new Promise<never>((_resolve, reject) => {
		timer = setTimeout(() => reject(new Error('the delivery took too long')), ms);
	});
	return Promise.race([work, late]).finally(() => clearTimeout(timer));
}

async function deliver(settings: SenderSettings, message: OutboxRow): Promise<void> {
	const silence = settings.silenceMs ?? 30_000;
	const transport = createTransport({
		url: settings.smtpUrl,
		connectionTimeout: silence,
		greetingTimeout: silence,
		socketTimeout: silence,
		disableFileAccess: true,
		disableUrlAccess: true
	} as Parameters<typeof createTransport>[0]);
	try {
		await withDeadline(
			transport.sendMail({
				messageId: messageIdOf(message.id, settings.from),
				from: settings.from,
				to: { name: '', address: message.to },
				subject: message.subject,
				text: message.text,
				attachments: listAttachments(settings.db, message.id)
			}),
			DELIVERY_MS
		);
	} finally {
		transport.close();
	}
}

/**
 * Claims the next due message, sends it and records how it fared. Returns whether there was one.
 * The claim is committed before the first byte goes out and the mark after the server's answer: a crash
 * before the answer sends again, and only a crash between answer and mark can deliver twice.
 */
export async function sendNext(settings: SenderSettings): Promise<boolean> {
	const token = newId();
	const start = settings.now();
	const message = write(settings.db, (tx) =>
		claimMessage(tx, { token, now: start, until: start + LEASE_MS })
	);
	if (!message) return false;
	const failure = await deliver(settings, message).then(
		() => null,
		(cause: Error) => cause
	);
	const now = settings.now();
	const outcome = failure
		? outcomeOfFailure(failure, { attempts: message.attempts, now, random: settings.random })
		: { state: 'sent' as const, nextAt: now, error: '', now };
	// Neither the address nor the text of a message belongs in the log.
	if (failure) log.warn({ outboxId: message.id, state: outcome.state }, 'message not sent');
	write(settings.db, (tx) => settleMessage(tx, { id: message.id, token }, outcome));
	return true;
}
