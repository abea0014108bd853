import type { EndKind } from '../../../domain/profiles/ends';

/** Profiles and materials are named by the codes of `catalog.ts`. */
export interface DemoRun {
	readonly unit: string | null;
	readonly profile: 'HF' | 'FA' | 'DE';
	readonly material: 'ST24-SG31' | 'AL40-BW07';
	readonly face: string;
	readonly left: EndKind;
	readonly right: EndKind;
	readonly level: number;
	readonly height: string;
	/** Measured at the building and checked; otherwise the run is on hold. */
	readonly verified: boolean;
	readonly note?: string;
	/** The run to its left carries the tab of their corner, so this end adds nothing. */
	readonly cornerCarried?: boolean;
}

interface DemoCanopy {
	readonly mark: string;
	readonly name: string;
	readonly width: string;
	readonly projection: string;
	/** Side faces differ from the projection by what the wall is out of plumb. */
	readonly leftSide: string;
	readonly rightSide: string;
	readonly headWidth: string;
	readonly verified: boolean;
}

export interface DemoElevation {
	readonly code: string;
	readonly name: string;
	readonly material: 'ST24-SG31' | 'AL40-BW07';
	readonly wallLine: string;
	readonly wallVerified: boolean;
	readonly canopies: readonly DemoCanopy[];
}

export const DEMO_ELEVATIONS: readonly DemoElevation[] = [
	{
		code: 'N',
		name: 'North, Millrace Street',
		material: 'ST24-SG31',
		wallLine: `47'-9 1/2"`,
		wallVerified: true,
		canopies: [
			canopy(
				'K1',
				'Canopy at the main door',
				`18'-6 3/8"`,
				`4'-0"`,
				`4'-0 1/16"`,
				`3'-11 15/16"`,
				`18'-10 3/8"`
			),
			canopy(
				'K2',
				'Canopy at the bookshop',
				`14'-7 3/4"`,
				`4'-0"`,
				`4'-0 1/8"`,
				`4'-0"`,
				`14'-11 3/4"`
			)
		]
	},
	{
		code: 'E',
		name: 'East, Tanner Lane',
		material: 'ST24-SG31',
		wallLine: `33'-2 7/8"`,
		wallVerified: true,
		canopies: [
			canopy(
				'K3',
				'Canopy at the café',
				`22'-3 1/4"`,
				`5'-0"`,
				`5'-0 3/16"`,
				`4'-11 7/8"`,
				`22'-7 1/4"`
			),
			canopy(
				'K4',
				'Awning at the stair',
				`8'-9 5/16"`,
				`3'-6"`,
				`3'-6 1/16"`,
				`3'-6"`,
				`9'-1 5/16"`
			)
		]
	},
	{
		code: 'W',
		name: 'West, loading yard',
		material: 'AL40-BW07',
		wallLine: `52'-0 3/16"`,
		wallVerified: false,
		canopies: [
			canopy(
				'K5',
				'Canopy at dock 1',
				`26'-4 1/2"`,
				`6'-0"`,
				`6'-0 1/4"`,
				`6'-0 1/8"`,
				`26'-8 1/2"`
			),
			{
				...canopy(
					'K6',
					'Canopy at dock 2',
					`26'-5 1/16"`,
					`6'-0"`,
					`6'-0"`,
					`6'-0 3/16"`,
					`26'-9 1/16"`
				),
				verified: false
			}
		]
	},
	{
		code: 'C',
		name: 'Court, inner face',
		material: 'AL40-BW07',
		wallLine: `38'-11 3/4"`,
		wallVerified: true,
		canopies: [
			canopy(
				'K7',
				'Canopy at the lift',
				`11'-2 1/8"`,
				`4'-6"`,
				`4'-6 1/16"`,
				`4'-6"`,
				`11'-6 1/8"`
			),
			canopy(
				'K8',
				'Canopy at the workshops',
				`31'-8 5/8"`,
				`4'-6"`,
				`4'-6"`,
				`4'-6 1/8"`,
				`32'-0 5/8"`
			)
		]
	}
];

function canopy(
	mark: string,
	name: string,
	width: string,
	projection: string,
	leftSide: string,
	rightSide: string,
	headWidth: string
): DemoCanopy {
	return { mark, name, width, projection, leftSide, rightSide, headWidth, verified: true };
}

/** Seven runs close a canopy: head flashing, fascia on three sides, drip edge on three sides. */
export function canopyRuns(unit: DemoCanopy, material: DemoElevation['material']): DemoRun[] {
	const base = { unit: unit.mark, material, height: `10'-6"`, verified: unit.verified };
	const carried = { ...base, cornerCarried: true };
	const side = (profile: 'FA' | 'DE', level: number): DemoRun[] => [
		{ ...base, profile, level, face: unit.leftSide, left: 'butt', right: 'corner-outside' },
		{
			...carried,
			profile,
			level,
			face: unit.width,
			left: 'corner-outside',
			right: 'corner-outside'
		},
		{ ...carried, profile, level, face: unit.rightSide, left: 'corner-outside', right: 'butt' }
	];
	const head: DemoRun = {
		...base,
		profile: 'HF',
		level: 2,
		face: unit.headWidth,
		left: 'end-dam',
		right: 'end-dam',
		note: 'Ends turned up behind the cladding'
	};
	return [...side('DE', 0), ...side('FA', 1), head];
}

/** The wall line above the canopies, closed at both ends. */
export const wallLine = (elevation: DemoElevation): DemoRun => ({
	unit: null,
	profile: 'HF',
	material: elevation.material,
	face: elevation.wallLine,
	left: 'closed',
	right: 'closed',
	level: 3,
	height: `13'-0"`,
	verified: elevation.wallVerified
});
