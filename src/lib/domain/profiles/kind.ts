import { INCH, length, type Length } from '../lengths/length';
import type { ProfileShape } from './profile';

/** A dimension of a trade kind that a shop sets. */
export interface KindDimension {
	readonly key: string;
	readonly label: string;
	readonly standard: Length;
}

/** How an end of this kind is closed from its own metal. */
export interface Closing {
	/** Name of the leg that is lengthened and folds; empty when the kind is never closed. */
	readonly leg: string;
	readonly by: 'folds-back' | 'folds-down' | 'dam' | 'none';
	/** Legs hidden behind the wall or deck, which a fold need not cover. */
	readonly hidden: readonly string[];
}

export interface ProfileKind {
	readonly kind: string;
	readonly purpose: string;
	readonly dimensions: readonly KindDimension[];
	readonly build: (dimensions: Readonly<Record<string, Length>>) => ProfileShape;
	readonly closing: Closing;
	readonly joint: 'lap' | 'plate';
	readonly lap: Length;
	readonly concealed: boolean;
}

export const eighths = (count: number): Length => length((INCH / 8) * count);
export const HALF = eighths(4);

export type LegSpec = readonly [name: string, length: Length, turn: number];

/** Wall at the left, finish on the outside: walking the legs, the finished side is on the left hand. */
export function shape(
	heading: number,
	legs: readonly LegSpec[],
	hems: { readonly start?: Length; readonly end?: Length } = {}
): ProfileShape {
	const hem = (width: Length | undefined) => (width ? ({ kind: 'closed', width } as const) : null);
	return {
		heading,
		legs: legs.map(([name, leg, turn]) => ({ name, length: leg, turn })),
		startHem: hem(hems.start),
		endHem: hem(hems.end),
		insideRadius: length(INCH / 32),
		finished: 'left',
		girth: 'outside'
	};
}

export const dimension = (key: string, label: string, standard: Length): KindDimension => ({
	key,
	label,
	standard
});
export const FACE = (standard: Length) => dimension('face', 'Face', standard);
export const KICK = dimension('kick', 'Kick', HALF);
export const HEM = dimension('hem', 'Hem', HALF);

export const FOLDS_BACK: Closing = { leg: 'face', by: 'folds-back', hidden: [] };
export const NOT_CLOSED: Closing = { leg: '', by: 'none', hidden: [] };
