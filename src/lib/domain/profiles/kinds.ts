import { INCH, inches, length, type Length } from '../lengths/length';
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

const eighths = (count: number): Length => length((INCH / 8) * count);
const HALF = eighths(4);

type LegSpec = readonly [name: string, length: Length, turn: number];

/** Wall at the left, finish on the outside: walking the legs, the finished side is on the left hand. */
function shape(
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

const dimension = (key: string, label: string, standard: Length): KindDimension => ({
	key,
	label,
	standard
});
const FACE = (standard: Length) => dimension('face', 'Face', standard);
const KICK = dimension('kick', 'Kick', HALF);
const HEM = dimension('hem', 'Hem', HALF);

const FOLDS_BACK: Closing = { leg: 'face', by: 'folds-back', hidden: [] };
const NOT_CLOSED: Closing = { leg: '', by: 'none', hidden: [] };

/**
 * The trade's kinds of trim with standard dimensions of our own, every one editable. Laps follow
 * reference/laps: drip edge 2 in, coping and fascia 4 in, the rest 3 in.
 */
export const profileKinds: readonly ProfileKind[] = [
	{
		kind: 'drip edge',
		purpose: 'Throws water clear at the edge of a canopy deck',
		dimensions: [dimension('flange', 'Deck flange', inches(3)), FACE(inches(2)), KICK, HEM],
		build: ({ flange, face, kick, hem }) =>
			shape(
				0,
				[
					['flange', flange!, -9_000],
					['face', face!, 4_500],
					['kick', kick!, 0]
				],
				{ end: hem }
			),
		closing: FOLDS_BACK,
		joint: 'lap',
		lap: inches(2),
		concealed: false
	},
	{
		kind: 'head flashing',
		purpose: 'Sheds water over the head of an opening or canopy',
		dimensions: [
			dimension('wall', 'Wall leg', inches(4)),
			dimension('top', 'Top', inches(3)),
			FACE(inches(2)),
			KICK,
			HEM
		],
		build: ({ wall, top, face, kick, hem }) =>
			shape(
				-9_000,
				[
					['wall', wall!, 8_200],
					['top', top!, -8_200],
					['face', face!, 4_500],
					['kick', kick!, 0]
				],
				{ end: hem }
			),
		closing: FOLDS_BACK,
		joint: 'lap',
		lap: inches(3),
		concealed: false
	},
	{
		kind: 'counterflashing',
		purpose: 'Covers the top edge of a base flashing from a slot in the wall',
		dimensions: [dimension('tuck', 'Into the wall', inches(1)), FACE(inches(4)), KICK, HEM],
		build: ({ tuck, face, kick, hem }) =>
			shape(
				0,
				[
					['tuck', tuck!, -9_000],
					['face', face!, 4_500],
					['kick', kick!, 0]
				],
				{ end: hem }
			),
		closing: { leg: 'face', by: 'folds-back', hidden: ['tuck'] },
		joint: 'lap',
		lap: inches(3),
		concealed: false
	},
	{
		kind: 'sill',
		purpose: 'Carries water out from under an opening',
		dimensions: [
			dimension('upstand', 'Upstand', inches(1)),
			dimension('top', 'Slope', inches(4)),
			FACE(eighths(12)),
			KICK,
			HEM
		],
		build: ({ upstand, top, face, kick, hem }) =>
			shape(
				-9_000,
				[
					['upstand', upstand!, 8_000],
					['top', top!, -8_000],
					['face', face!, 4_500],
					['kick', kick!, 0]
				],
				{ end: hem }
			),
		closing: { leg: 'top', by: 'dam', hidden: ['upstand'] },
		joint: 'lap',
		lap: inches(3),
		concealed: false
	},
	{
		kind: 'jamb',
		purpose: 'Closes the side of an opening against the wall',
		dimensions: [FACE(inches(2)), dimension('return', 'Return', inches(3)), HEM],
		build: ({ face, return: back, hem }) =>
			shape(
				0,
				[
					['face', face!, -9_000],
					['return', back!, 0]
				],
				{ start: hem }
			),
		closing: { leg: 'face', by: 'folds-down', hidden: [] },
		joint: 'lap',
		lap: inches(3),
		concealed: false
	},
	{
		kind: 'coping',
		purpose: 'Caps the top of a wall',
		dimensions: [dimension('top', 'Top', inches(9)), FACE(inches(4)), KICK, HEM],
		build: ({ top, face, kick, hem }) =>
			shape(
				4_500,
				[
					['kick', kick!, 4_500],
					['face', face!, -9_000],
					['top', top!, -9_000],
					['face', face!, 4_500],
					['kick', kick!, 0]
				],
				{ start: hem, end: hem }
			),
		closing: { leg: 'top', by: 'folds-down', hidden: [] },
		joint: 'plate',
		lap: inches(4),
		concealed: false
	},
	{
		kind: 'fascia',
		purpose: 'Faces the edge of a canopy',
		dimensions: [
			dimension('top', 'Top', eighths(12)),
			FACE(inches(6)),
			dimension('under', 'Under', eighths(6))
		],
		build: ({ top, face, under }) =>
			shape(0, [
				['top', top!, -9_000],
				['face', face!, -9_000],
				['under', under!, 0]
			]),
		closing: FOLDS_BACK,
		joint: 'lap',
		lap: inches(4),
		concealed: false
	},
	{
		kind: 'gutter apron',
		purpose: 'Leads water from the deck into the gutter',
		dimensions: [dimension('flange', 'Deck flange', inches(4)), FACE(eighths(20)), HEM],
		build: ({ flange, face, hem }) =>
			shape(
				0,
				[
					['flange', flange!, -8_000],
					['face', face!, 0]
				],
				{ end: hem }
			),
		closing: FOLDS_BACK,
		joint: 'lap',
		lap: inches(3),
		concealed: false
	},
	{
		kind: 'cleat',
		purpose: 'Hidden strip that holds the hem of the trim over it',
		dimensions: [FACE(eighths(20)), dimension('kick', 'Kick', eighths(6))],
		build: ({ face, kick }) =>
			shape(-9_000, [
				['face', face!, 4_500],
				['kick', kick!, 0]
			]),
		closing: NOT_CLOSED,
		joint: 'plate',
		lap: inches(3),
		concealed: true
	},
	{
		kind: 'cover plate',
		purpose: 'Bridges the gap between two coping lengths',
		dimensions: [dimension('top', 'Top', eighths(73)), FACE(inches(4))],
		build: ({ top, face }) =>
			shape(9_000, [
				['face', face!, -9_000],
				['top', top!, -9_000],
				['face', face!, 0]
			]),
		closing: NOT_CLOSED,
		joint: 'plate',
		lap: inches(3),
		concealed: false
	}
];

/** Returns the kind of that name; undefined for a profile of the shop's own. */
export const findKind = (kind: string): ProfileKind | undefined =>
	profileKinds.find((each) => each.kind === kind);

/** Returns the shape of a kind, its standard dimensions replaced by those given. */
export const shapeOf = (
	kind: ProfileKind,
	dimensions: Readonly<Record<string, Length>> = {}
): ProfileShape =>
	kind.build({
		...Object.fromEntries(kind.dimensions.map(({ key, standard }) => [key, standard])),
		...dimensions
	});
