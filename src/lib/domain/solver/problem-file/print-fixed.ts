import { length, type Length } from '../../lengths/length';
import type { PlannedStick } from '../../plan/plan';
import { usedOf, type FixedStick } from './fixed';
import type { FileProblem } from './read-problem';

/** A fixed stick as it ends: the cuts already made, then those that the plan adds, and what is left. */
export function printFixed(
	problem: FileProblem,
	stick: FixedStick,
	sticks: readonly PlannedStick[],
	print: (of: Length) => string | number
) {
	const added = sticks.find(({ source }) => source.kind === 'offcut' && source.id === stick.id);
	const used = usedOf(stick, problem.kerf);
	let at = 0;
	const made = stick.cuts.map((cut) => {
		const printed = {
			mark: cut.mark,
			length: print(cut.length),
			at: print(length(at)),
			made: true
		};
		at += cut.length + problem.kerf;
		return printed;
	});
	const more = (added?.cuts ?? []).map((cut) => {
		const start = print(length(used + cut.at));
		return { mark: cut.mark, length: print(cut.length), at: start, made: false };
	});
	const { hook, far } = problem.squaring;
	const left = added?.left ?? length(Math.max(0, stick.length - hook - far - used));
	return {
		id: stick.id,
		length: print(stick.length),
		cuts: [...made, ...more],
		left: print(left)
	};
}
