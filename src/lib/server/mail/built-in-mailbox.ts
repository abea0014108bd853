import { simpleParser } from 'mailparser';
import type { AddressInfo } from 'node:net';
import { SMTPServer, type SMTPServerDataStream } from 'smtp-server';
import { isId } from '../../forms/id';
import { write, type Database } from '../db/client';
import { findMessageSource } from '../queries/outbox';
import { keepMessage } from '../queries/mailbox';

/** Largest message taken, in bytes: an order with its spreadsheet is far below. */
const LARGEST = 25_000_000;

export interface BuiltInMailbox {
	readonly port: number;
	close(): Promise<void>;
}

async function readAll(stream: SMTPServerDataStream): Promise<Buffer> {
	const parts: Buffer[] = [];
	for await (const part of stream) parts.push(part as Buffer);
	return Buffer.concat(parts);
}

const refusal = (code: number, sentence: string) =>
	Object.assign(new Error(sentence), { responseCode: code });

const addressText = (of: { text: string } | { text: string }[] | undefined): string =>
	of === undefined ? '' : Array.isArray(of) ? of.map((one) => one.text).join(', ') : of.text;

/** Reads one delivered message and keeps it, if it is one that this server wrote. */
async function take(db: Database, raw: Buffer): Promise<void> {
	const mail = await simpleParser(raw, { skipHtmlToText: true, skipTextToHtml: true });
	const messageId = mail.messageId ?? '';
	const id = /^<([^@<>]+)@/.exec(messageId)?.[1] ?? '';
	const source = isId(id) ? findMessageSource(db, id) : undefined;
	if (!source) throw refusal(550, 'this mailbox takes only what this server sends');
	write(db, (tx) =>
		keepMessage(
			tx,
			{
				id,
				shopId: source.shopId,
				messageId,
				from: addressText(mail.from),
				to: addressText(mail.to),
				subject: mail.subject ?? '',
				text: mail.text ?? '',
				attachments: mail.attachments.map((one) => ({
					filename: one.filename ?? 'attachment',
					contentType: one.contentType,
					content: one.content
				}))
			},
			Date.now()
		)
	);
}

/**
 * A mail server of our own on a free loopback port, for a shop without one: what is sent is kept and shown on
 * the mailbox page, and leaves the machine never. Spoken to over SMTP like any other, so nothing is special.
 */
export async function openBuiltInMailbox(db: Database): Promise<BuiltInMailbox> {
	const server = new SMTPServer({
		authOptional: true,
		disabledCommands: ['AUTH', 'STARTTLS'],
		disableReverseLookup: true,
		size: LARGEST,
		closeTimeout: 1000,
		onData(stream, _session, done) {
			readAll(stream)
				.then((raw) => {
					if (stream.sizeExceeded) throw refusal(552, 'the message is too large');
					return take(db, raw);
				})
				.then(() => done(), done);
		}
	});
	// A client that hangs up in the middle is the client's affair; without a listener it would end the process.
	server.on('error', () => undefined);
	await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
	return {
		port: (server.server.address() as AddressInfo).port,
		close: () => new Promise((resolve) => server.close(resolve))
	};
}
