import { feet, inches, length, type Length } from '../../../domain/lengths/length';

const mils = (thousandths: number): Length => length(thousandths * 25_400);

export const DEMO_PROFILES = [
	{ code: 'HF', name: 'Head flashing 4 in', kind: 'head flashing' },
	{ code: 'FA', name: 'Canopy fascia', kind: 'fascia' },
	{ code: 'DE', name: 'Drip edge 2 in', kind: 'drip edge' }
] as const;

/** Thickness and weight: galvanized 24 ga 0.0276 in, 1.156 lb/ft²; aluminum 0.040 in, 0.570 lb/ft² (reference/). */
export const DEMO_MATERIALS = [
	{
		code: 'ST24-SG31',
		metal: 'galvanized steel',
		thicknessNm: length(701_040),
		gaugeLabel: '24 ga',
		finish: 'prefinished',
		colourName: 'Slate grey',
		colourCode: 'SG-31',
		gramsPerSquareMetre: 5644
	},
	{
		code: 'AL40-BW07',
		metal: 'aluminum 3003',
		thicknessNm: mils(40),
		gaugeLabel: '',
		finish: 'prefinished',
		colourName: 'Bone white',
		colourCode: 'BW-07',
		gramsPerSquareMetre: 2783
	}
] as const;

export const DEMO_SUPPLIERS = [
	{
		code: 'steel',
		name: 'Ostlerfield Forming',
		email: 'orders@ostlerfield.example',
		phone: '555-0142',
		minimumOrderCents: 50_000,
		freightCents: 8_500,
		leadDays: 9
	},
	{
		code: 'aluminum',
		name: 'Quarrelbeck Metals',
		email: 'desk@quarrelbeck.example',
		phone: '555-0178',
		minimumOrderCents: 75_000,
		freightCents: 12_000,
		leadDays: 15
	}
] as const;

interface DemoStock {
	readonly profile: 'HF' | 'FA' | 'DE';
	readonly material: 'ST24-SG31' | 'AL40-BW07';
	readonly nominalNm: Length;
	readonly priceCents: number;
	readonly bundleSize: number;
	readonly bundlePriceCents: number | null;
	readonly standard: boolean;
}

const stick = (
	profile: DemoStock['profile'],
	material: DemoStock['material'],
	long: 10 | 12,
	priceCents: number,
	bundleSize = 1,
	bundlePriceCents: number | null = null
): DemoStock => ({
	profile,
	material,
	nominalNm: feet(long),
	priceCents,
	bundleSize,
	bundlePriceCents,
	standard: long === 10
});

export const DEMO_STOCK: readonly DemoStock[] = [
	stick('HF', 'ST24-SG31', 10, 2140, 5, 10_200),
	stick('HF', 'ST24-SG31', 12, 2610),
	stick('FA', 'ST24-SG31', 10, 3375, 5, 16_100),
	stick('FA', 'ST24-SG31', 12, 4120),
	stick('DE', 'ST24-SG31', 10, 1160, 10, 11_000),
	stick('DE', 'ST24-SG31', 12, 1425),
	stick('HF', 'AL40-BW07', 10, 2480, 4, 9_600),
	stick('FA', 'AL40-BW07', 10, 3820, 4, 14_800),
	stick('FA', 'AL40-BW07', 12, 4655),
	stick('DE', 'AL40-BW07', 10, 1390, 10, 13_200),
	stick('DE', 'AL40-BW07', 12, 1710)
];

/** What hangs on the rack from earlier jobs, and full sticks on hand. */
export const DEMO_METAL = [
	{
		kind: 'offcut',
		label: 'R-1',
		profile: 'HF',
		material: 'ST24-SG31',
		long: `7'-3 1/2"`,
		place: 'Rack A, arm 2'
	},
	{
		kind: 'offcut',
		label: 'R-2',
		profile: 'HF',
		material: 'ST24-SG31',
		long: `4'-1 1/4"`,
		place: 'Rack A, arm 2'
	},
	{
		kind: 'offcut',
		label: 'R-3',
		profile: 'FA',
		material: 'ST24-SG31',
		long: `5'-6"`,
		place: 'Rack A, arm 3'
	},
	{
		kind: 'offcut',
		label: 'R-4',
		profile: 'DE',
		material: 'ST24-SG31',
		long: `8'-0 3/8"`,
		place: 'Rack A, arm 4'
	},
	{
		kind: 'offcut',
		label: 'R-5',
		profile: 'DE',
		material: 'AL40-BW07',
		long: `6'-7 3/4"`,
		place: 'Rack B, arm 1'
	},
	{
		kind: 'offcut',
		label: 'R-6',
		profile: 'FA',
		material: 'AL40-BW07',
		long: `9'-2"`,
		place: 'Rack B, arm 1'
	},
	{
		kind: 'stick',
		label: 'S-1',
		profile: 'DE',
		material: 'ST24-SG31',
		long: `10'-0"`,
		place: 'Bay 2'
	},
	{
		kind: 'stick',
		label: 'S-2',
		profile: 'DE',
		material: 'ST24-SG31',
		long: `10'-0"`,
		place: 'Bay 2'
	},
	{
		kind: 'stick',
		label: 'S-3',
		profile: 'HF',
		material: 'AL40-BW07',
		long: `10'-0"`,
		place: 'Bay 3'
	}
] as const;

export const DEMO_END_OPTIONS = { outsideTab: inches(1) } as const;
