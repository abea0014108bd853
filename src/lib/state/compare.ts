/** Which alternates a job is compared in, and their figures at typing speed. */
import {
	addFigures,
	alternateFigures,
	type Alternate,
	type JobFigures
} from '../domain/bid/compare';
import { standardStick, type BidRules, type BidRun, type BidStock } from '../domain/bid/figures';
import { formatLength } from '../domain/lengths/format';
import type { Length } from '../domain/lengths/length';
import { parseLength } from '../domain/lengths/parse';
import type { UnitSystem } from '../domain/lengths/units';
import { describeProblem } from '../domain/result';
import type { ProfileRules } from '../domain/takeoff/resolve-run';

export interface CompareInput {
	readonly units: UnitSystem;
	readonly rules: BidRules;
	readonly runs: readonly BidRun[];
	readonly stock: readonly BidStock[];
	readonly profiles: readonly (ProfileRules & {
		readonly id: string;
		readonly code: string;
		readonly girthNm: number;
	})[];
	readonly materials: readonly {
		readonly id: string;
		readonly code: string;
		readonly gramsPerSquareMetre: number;
	}[];
}

/** One row of the comparison. `nominal` null keeps each run's standard stick and offers every stock length. */
export interface Choice {
	readonly key: string;
	readonly nominal: Length | null;
	readonly lap: Length | null;
}

/** Nominal lengths that the shop prices for what the job uses, shortest first. */
export function pricedLengths({ runs, stock }: CompareInput): Length[] {
	const used = new Set(runs.map((run) => `${run.profileId} ${run.materialId}`));
	const lengths = stock
		.filter((one) => used.has(`${one.profileId} ${one.materialId}`))
		.map((one) => one.nominalNm);
	return [...new Set(lengths)].sort((a, b) => a - b);
}

/** Typed laps such as `2, 3, 4` or `2"; 3"`, and the sentence of the first that does not read. */
export function readLaps(
	text: string,
	units: UnitSystem
): { laps: Length[]; problem: string | null } {
	const laps: Length[] = [];
	for (const part of text.split(/[;,]/).map((each) => each.trim())) {
		if (part === '') continue;
		const read = parseLength(part, { units, where: 'Lap', range: 'positive' });
		if (!read.ok) return { laps, problem: describeProblem(read.problem) };
		if (!laps.includes(read.value)) laps.push(read.value);
	}
	return { laps: laps.slice(0, 4), problem: null };
}

export const choicesOf = (lengths: readonly Length[], laps: readonly Length[]): Choice[] =>
	lengths.flatMap((nominal) =>
		(laps.length > 0 ? laps : [null]).map((lap) => ({
			key: `${nominal}/${lap ?? ''}`,
			nominal,
			lap
		}))
	);

export const AS_TAKEN: Choice = { key: 'as-taken', nominal: null, lap: null };

/** Figures of the whole job for one choice: an estimate unless a certificate proves it. */
export function figuresFor(choice: Choice, input: CompareInput): JobFigures {
	const keys = [
		...new Set(
			input.runs
				.filter((run) => run.scope === 'us')
				.map((run) => `${run.profileId} ${run.materialId}`)
		)
	];
	return addFigures(
		choice.key,
		keys.map((key) => partFor(choice, key, input))
	);
}

function partFor(choice: Choice, key: string, input: CompareInput) {
	const [profileId, materialId] = key.split(' ');
	const profile = input.profiles.find((one) => one.id === profileId)!;
	const material = input.materials.find((one) => one.id === materialId)!;
	const runs = input.runs.filter(
		(run) => run.profileId === profileId && run.materialId === materialId
	);
	const stock = input.stock.filter(
		(one) =>
			one.profileId === profileId &&
			one.materialId === materialId &&
			(choice.nominal === null || one.nominalNm === choice.nominal)
	);
	const weight = (profile.girthNm / 1e9) * material.gramsPerSquareMetre;
	const stick = standardStick(stock);
	if (!stick) return { weight, figures: withoutStock(choice, profile.code, material.code, input) };
	const alternate: Alternate = { key, stock, stick, lap: choice.lap };
	return { weight, figures: alternateFigures(alternate, runs, profile, input.rules) };
}

function withoutStock(choice: Choice, profile: string, material: string, input: CompareInput) {
	const wanted =
		choice.nominal === null ? '' : ` of ${formatLength(choice.nominal, { units: input.units })}`;
	return {
		key: choice.key,
		pieces: 0,
		joints: 0,
		lengths: 0,
		costCents: 0,
		boundCents: 0,
		proven: false,
		waste: { part: 0 as Length, of: 0 as Length },
		firstCome: null,
		problems: [`${profile} in ${material}: no stock length${wanted} is priced.`]
	};
}
