import type { BackgroundTask } from '../background';
import { config } from '../config';
import { getDatabase } from '../db/client';
import { log } from '../log';
import { openBuiltInMailbox, type BuiltInMailbox } from './built-in-mailbox';
import { sendNext, type SenderSettings } from './sender';

/** How often the outbox is looked at: a message leaves within a second of its commit. */
const PAUSE_MS = 1000;

/** Opens the built-in mailbox when no mail server is configured, and sends what waits in the outbox. */
export function mailTask(): BackgroundTask {
	let mailbox: BuiltInMailbox | null = null;
	let timer: NodeJS.Timeout | undefined;
	let working: Promise<void> = Promise.resolve();
	let stopped = false;

	async function sendAll(settings: SenderSettings): Promise<void> {
		try {
			while (!stopped && (await sendNext(settings)));
		} catch (cause) {
			// A locked or full database passes; the message stays claimed until its lease ends.
			log.error({ err: cause }, 'the outbox could not be read');
		}
		if (!stopped) timer = setTimeout(() => (working = sendAll(settings)), PAUSE_MS);
	}

	return {
		name: 'mail',
		async start() {
			const db = getDatabase();
			if (!config.smtpUrl) mailbox = await openBuiltInMailbox(db);
			const smtpUrl = mailbox ? `smtp://127.0.0.1:${mailbox.port}` : config.smtpUrl;
			working = sendAll({
				db,
				smtpUrl,
				from: config.mailFrom,
				now: Date.now,
				random: Math.random
			});
		},
		async stop() {
			stopped = true;
			clearTimeout(timer);
			await Promise.race([working, new Promise((resolve) => setTimeout(resolve, 2000).unref())]);
			await mailbox?.close();
		}
	};
}
