import type { ActAnswer } from '../../forms/site';
import type { SiteList } from '../../forms/site-list';
import type { KeptAct } from './store';

/** Pieces ticked fitted: what the server said, then what was done here since, in order. */
export function fittedNow(list: SiteList, acts: readonly KeptAct[]): ReadonlySet<string> {
	const fitted = new Set(list.fitted);
	for (const { act, refusal } of acts) {
		if (act.kind !== 'fitted' || refusal !== '') continue;
		for (const id of act.pieceIds) {
			if (act.done) fitted.add(id);
			else fitted.delete(id);
		}
	}
	return fitted;
}

/** The acts that stay after answers: those not sent, and refused ones with the reason. */
export function afterAnswers(
	acts: readonly KeptAct[],
	sent: readonly KeptAct[],
	answers: readonly ActAnswer[]
): readonly KeptAct[] {
	return acts.flatMap((kept) => {
		if (!sent.includes(kept)) return [kept];
		const answer = answers.find((of) => of.opId === kept.act.opId);
		return answer?.state === 'refused' ? [{ ...kept, refusal: answer.sentence }] : [];
	});
}
