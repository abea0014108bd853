import { siteActSchema, type ActAnswer, type SiteAct } from '../../forms/site';
import type { Context } from '../context';
import { zodProblems } from '../http/read-json';
import { markFitted } from './mark-fitted';
import { recordMeasure } from './record-measure';

/** The name a device gave to an act that could not be read, if it gave one. */
function opIdOf(raw: unknown): string {
	const named = (raw as { opId?: unknown } | null)?.opId;
	return typeof named === 'string' ? named.slice(0, 64) : '';
}

const perform = (ctx: Context, act: SiteAct): ActAnswer =>
	act.kind === 'fitted' ? markFitted(ctx, act) : recordMeasure(ctx, act);

/** Performs acts one by one in the order they were done; each is answered, whatever becomes of the others. */
export function performActs(ctx: Context, acts: readonly unknown[]): ActAnswer[] {
	return acts.map((raw) => {
		const read = siteActSchema.safeParse(raw);
		if (read.success) return perform(ctx, read.data);
		const sentence = zodProblems(read.error, raw)
			.map((problem) => problem.sentence)
			.join(' ');
		return { opId: opIdOf(raw), state: 'refused', sentence };
	});
}
