import type { ActAnswer, SiteAct } from '../../forms/site';
import { listActs, settleActs, type KeptAct } from './store';

/** How a try to send ended. */
export type Sent =
	| { readonly state: 'sent'; readonly at: number | null; readonly answers: readonly ActAnswer[] }
	| { readonly state: 'offline' }
	| { readonly state: 'signed-out' };

const BATCH = 50;

/** Sends the acts one viewer keeps, oldest first; null sends whoever's is signed in. Idempotent by `opId`. */
export async function sendKeptActs(viewer: string | null = null): Promise<Sent> {
	const answers: ActAnswer[] = [];
	let at: number | null = null;
	for (;;) {
		const waiting = (await listActs()).filter(
			(kept) => kept.refusal === '' && (viewer === null || kept.viewer === viewer)
		);
		if (waiting.length === 0) return { state: 'sent', at, answers };
		const sent = await sendBatch(waiting.slice(0, BATCH));
		if (sent.state !== 'sent') return sent;
		at = sent.at;
		answers.push(...sent.answers);
	}
}

async function sendBatch(batch: readonly KeptAct[]): Promise<Sent> {
	const sent = await postActs(batch.map((kept) => kept.act));
	if (sent.state !== 'sent') return sent;
	await settleActs(
		batch.map((kept, index) => {
			const answer = sent.answers[index];
			const refused = answer?.state === 'refused';
			return { seq: kept.seq!, refusal: refused ? answer.sentence : null };
		})
	);
	return sent;
}

/** One request; what fails for want of signal or by a fault of the server is tried again later. */
export async function postActs(acts: readonly SiteAct[]): Promise<Sent> {
	let response: Response;
	try {
		response = await fetch('/api/v1/site/acts', {
			method: 'POST',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify({ acts })
		});
	} catch (cause) {
		if (cause instanceof TypeError) return { state: 'offline' };
		throw cause;
	}
	if (response.status === 401 || response.status === 403) return { state: 'signed-out' };
	if (!response.ok) return { state: 'offline' };
	const body = (await response.json()) as { answers: ActAnswer[]; at: number };
	return { state: 'sent', at: body.at, answers: body.answers };
}
