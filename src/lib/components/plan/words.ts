import { formatLength } from '$lib/domain/lengths/format';
import { length } from '$lib/domain/lengths/length';
import type { UnitSystem } from '$lib/domain/lengths/units';
import { formatCents } from '$lib/domain/trade/money';
import type { GroupView, StickView } from '$lib/domain/plan/view';
import { m } from '$lib/paraglide/messages';

const plain = (nm: number, units: UnitSystem) => formatLength(length(nm), { units });

/** The numbers of sticks cut alike: `4`, `4–6`, `1, 3`. */
export function stickNumbers(sticks: readonly StickView[]): string {
	const numbers = sticks.map((stick) => stick.number);
	const [first] = numbers;
	const last = numbers.at(-1)!;
	if (numbers.length === 1) return String(first);
	if (last - first! === numbers.length - 1) return `${first}–${last}`;
	return numbers.length > 2 ? `${first}…${last}` : numbers.join(', ');
}

/** A stick as it is read aloud; the table beside it says the same in columns. */
export function stickInWords(sticks: readonly StickView[], units: UnitSystem): string {
	const [stick] = sticks;
	const source = stick!.offcut
		? m.plan_from_offcut({ label: stick!.offcut, length: plain(stick!.usableNm, units) })
		: m.plan_from_new({ length: plain(stick!.nominalNm, units) });
	const cuts = stick!.cuts.map((cut) => `${cut.mark} ${plain(cut.lengthNm, units)}`).join('; ');
	return m.plan_stick_words({
		numbers: stickNumbers(sticks),
		count: sticks.length,
		source,
		cuts,
		left: plain(stick!.leftNm, units)
	});
}

/** Proven, or best found with the bound and the gap, in words. */
export function verdictWords(group: GroupView, currency: string): string {
	if (group.status === 'impossible') return m.plan_words_impossible();
	const bound = boundWords(group, currency);
	if (group.status === 'proven') return m.plan_words_proven({ bound });
	return `${m.plan_words_best({ bound, gap: gapText(group) })} ${reasonWords(group.reason)}`;
}

const boundWords = (group: GroupView, currency: string): string => {
	if (group.bound.proof === 'none') return m.plan_bound_none();
	const searched = group.bound.proof === 'search';
	if (group.bound.lengths !== null && !searched)
		return m.plan_bound_lengths({ count: group.bound.lengths });
	if (group.costCents === null) return m.plan_bound_cost_hidden();
	const cents = sureBound(group);
	return cents === null
		? m.plan_bound_none()
		: m.plan_bound_cost({ cost: formatCents(cents, currency) });
};

/** A search's own value is evidence; what is said never to be undercut is the bound the checker recomputed. */
const sureBound = ({ bound, verdict }: GroupView): number | null =>
	bound.proof === 'search' ? verdict.boundCents : bound.costCents;

export function gapText(group: GroupView): string {
	const cost = group.verdict.costCents;
	const bound = sureBound(group);
	if (!cost || bound === null) return '–';
	return percentText((10_000 * (cost - bound)) / cost);
}

/** Hundredths of a percent as text: `4.3 %`. */
export const percentText = (basisPoints: number): string =>
	`${(Math.round(basisPoints) / 100).toFixed(Math.abs(basisPoints) < 100 ? 2 : 1)} %`;

const reasonWords = (reason: string): string =>
	({
		time: m.plan_reason_time(),
		cancelled: m.plan_reason_cancelled(),
		limit: m.plan_reason_limit(),
		search: m.plan_reason_search(),
		rule: m.plan_reason_rule()
	})[reason] ?? '';

export const planStateWord = (state: string): string =>
	({
		draft: m.plan_state_draft(),
		released: m.plan_state_released(),
		superseded: m.plan_state_superseded(),
		'set aside': m.plan_state_set_aside()
	})[state] ?? state;

export const solveStateWord = (state: string): string =>
	({
		waiting: m.plan_solve_waiting(),
		working: m.plan_solve_working(),
		done: m.plan_solve_done(),
		cancelled: m.plan_solve_cancelled(),
		failed: m.plan_solve_failed(),
		interrupted: m.plan_solve_interrupted()
	})[state] ?? state;

export const stageWord = (stage: string): string =>
	({
		starting: m.plan_stage_starting(),
		'first plan': m.plan_stage_first(),
		bound: m.plan_stage_bound(),
		columns: m.plan_stage_columns(),
		rounding: m.plan_stage_rounding(),
		diving: m.plan_stage_diving(),
		search: m.plan_stage_search()
	})[stage] ?? stage;

/** `Rev A`, or `To buy` with its margin. */
export const releaseName = (of: {
	kind: string;
	revision: string;
	marginPercent: number;
}): string =>
	of.kind === 'cut'
		? m.plan_kind_cut({ revision: of.revision })
		: `${m.plan_kind_buy()} +${of.marginPercent} %`;

export const changeWord = (change: string): string =>
	({
		new: m.plan_change_new(),
		changed: m.plan_change_changed(),
		removed: m.plan_change_removed(),
		unchanged: m.plan_change_unchanged()
	})[change] ?? change;

export const adviceWord = (advice: string): string =>
	({
		keep: m.plan_advice_keep(),
		rework: m.plan_advice_rework(),
		scrap: m.plan_advice_scrap()
	})[advice] ?? '';
