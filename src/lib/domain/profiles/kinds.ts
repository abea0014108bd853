import { inches, type Length } from '../lengths/length';
import {
	eighths,
	shape,
	dimension,
	FACE,
	KICK,
	HEM,
	FOLDS_BACK,
	NOT_CLOSED,
	type ProfileKind
} from './kind';
import type { ProfileShape } from './profile';

export type { Closing, KindDimension, ProfileKind } from './kind';

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
		joint: 'lap',
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
