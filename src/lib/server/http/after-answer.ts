import { log } from '../log';

/** Does work once the answer is on its way, so that its time tells the asker nothing; a failure is logged. */
export function afterAnswer(name: string, work: () => Promise<void>): void {
	setTimeout(() => {
		work().catch((cause: unknown) => log.error({ err: cause, work: name }, 'failed after answer'));
	}, 50);
}
