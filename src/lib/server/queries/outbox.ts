import type { Queryable } from '../db/client';
import { outbox, outboxAttachments } from '../db/schema/mail';
import { newId } from '../ids';
import type { Message } from '../mail/outbox';

export function insertOutbox(tx: Queryable, id: string, message: Message, now: number): void {
	const { attachments = [], ...row } = message;
	tx.insert(outbox)
		.values({ ...row, id, nextAt: now, createdAt: now })
		.run();
	for (const { filename, contentType, content } of attachments)
		tx.insert(outboxAttachments)
			.values({
				id: newId(),
				outboxId: id,
				filename,
				contentType,
				content: Buffer.from(content)
			})
			.run();
}
