import { formatLength } from '$lib/domain/lengths/format';
import { length } from '$lib/domain/lengths/length';
import { speakLength } from '$lib/domain/lengths/speak';
import type { UnitSystem } from '$lib/domain/lengths/units';
import type { Hem, ProfileShape } from '$lib/domain/profiles/profile';
import { m } from '$lib/paraglide/messages';
import type { Words } from './layout';

/** What stands on the drawing: prime marks, the leg's own name before its length. */
export const drawingWords = (units: UnitSystem): Words => {
	const write = (of: number) => formatLength(length(of), { units, style: 'prime' });
	return {
		leg: (leg) => [leg.name, write(leg.length)].filter(Boolean).join(' '),
		hem: (hem) =>
			hem.kind === 'open'
				? m.catalog_drawn_hem_open({ width: write(hem.width) })
				: m.catalog_drawn_hem({ width: write(hem.width) }),
		bend: (included) => `${included}°`,
		finished: m.catalog_finished()
	};
};

/** One bend in words: how far, and to which side of the metal. */
export function bendWords(turn: number, finished: ProfileShape['finished']): string {
	const degrees = Math.abs(turn) / 100;
	return turn > 0 === (finished === 'left')
		? m.catalog_bend_toward({ degrees })
		: m.catalog_bend_away({ degrees });
}

const hemWords = (edge: string, hem: Hem | null, units: UnitSystem): string[] =>
	hem ? [m.catalog_spoken_hem({ edge, kind: hem.kind, width: speakLength(hem.width, units) })] : [];

/** The whole profile in words, for whoever does not see the drawing: legs, bends and hems in order. */
export function profileInWords(shape: ProfileShape, units: UnitSystem, thickness?: number): string {
	const legs = shape.legs.flatMap((leg, i) => [
		m.catalog_spoken_leg({
			name: leg.name || m.catalog_leg({ number: i + 1 }),
			length: speakLength(leg.length, units)
		}),
		...(leg.turn === 0 ? [] : [bendWords(leg.turn, shape.finished)])
	]);
	const metal = thickness
		? [m.catalog_spoken_metal({ thickness: `${(thickness / 25_400_000).toFixed(4)} in` })]
		: [];
	const told = [
		...hemWords(m.catalog_first_edge(), shape.startHem, units),
		...legs,
		...hemWords(m.catalog_last_edge(), shape.endHem, units),
		...metal
	];
	return `${m.catalog_spoken_profile({ count: shape.legs.length })} ${told.join('; ')}.`;
}
