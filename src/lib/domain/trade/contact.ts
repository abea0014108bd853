/**
 * Cautions for metals that touch or drain onto each other. They defer to the approved drawings, the metal
 * producer and local code; none says that a pair is fit for use.
 */
import type { MetalName } from './metals';

type Family =
	'aluminum' | 'copper' | 'zinc coated' | 'aluminum-zinc' | 'stainless' | 'zinc' | 'lead';

/** What a metal may meet besides the metals themselves. */
export const SURFACES = ['bare steel', 'mortar or concrete', 'treated lumber'] as const;
export type Surface = (typeof SURFACES)[number];

export interface ContactCaution {
	readonly kind: 'contact' | 'run-off';
	readonly sentence: string;
	readonly source: string;
}

const FAMILY: Readonly<Record<MetalName, Family>> = {
	'galvanized steel': 'zinc coated',
	'aluminum-zinc coated steel': 'aluminum-zinc',
	'stainless steel 304': 'stainless',
	'stainless steel 316': 'stainless',
	'aluminum 3003': 'aluminum',
	'aluminum 3105': 'aluminum',
	'aluminum 5052': 'aluminum',
	copper: 'copper',
	'lead-coated copper': 'lead',
	zinc: 'zinc',
	lead: 'lead'
};

const GUIDE = 'federal guide specification 07600, §3.1.9';
const ALZN = 'coated-steel association bulletin 2';
const ORDINANCE = 'municipal code on flashing materials';
const TREATED = 'metal construction association position on treated lumber';

interface Rule {
	readonly one: readonly (Family | Surface)[];
	readonly other: readonly (Family | Surface)[];
	readonly sentence: string;
	readonly source: string;
}

const CONTACT: readonly Rule[] = [
	{
		one: ['aluminum'],
		other: ['copper', 'lead', 'bare steel'],
		sentence: 'Keep aluminum apart from copper, lead and bare steel, or paint between them.',
		source: GUIDE
	},
	{
		one: ['copper'],
		other: ['stainless', 'aluminum-zinc', 'lead', 'bare steel'],
		sentence: 'Separate copper from other metals with heavy bituminous paint or felt.',
		source: GUIDE
	},
	{
		one: ['copper'],
		other: ['zinc', 'zinc coated'],
		sentence: 'Do not use copper together with zinc or galvanized steel.',
		source: ORDINANCE
	},
	{
		one: ['aluminum-zinc'],
		other: ['copper', 'lead'],
		sentence: 'Aluminum-zinc coating corrodes fast against copper or lead: do not let them touch.',
		source: ALZN
	},
	{
		one: ['aluminum', 'zinc', 'zinc coated', 'aluminum-zinc', 'copper', 'lead', 'stainless'],
		other: ['mortar or concrete'],
		sentence: 'Coat metal that lies against mortar or concrete with an alkali-resistant coating.',
		source: GUIDE
	},
	{
		one: ['aluminum', 'zinc coated', 'aluminum-zinc'],
		other: ['treated lumber'],
		sentence: 'Isolate aluminum and coated steel from copper-treated lumber.',
		source: TREATED
	}
];

const RUN_OFF_ONTO: readonly Family[] = ['zinc', 'aluminum', 'zinc coated', 'aluminum-zinc'];

const isSurface = (of: MetalName | Surface): of is Surface =>
	(SURFACES as readonly string[]).includes(of);
const familyOf = (of: MetalName | Surface): Family | Surface => (isSurface(of) ? of : FAMILY[of]);

const applies = (rule: Rule, a: Family | Surface, b: Family | Surface) =>
	(rule.one.includes(a) && rule.other.includes(b)) ||
	(rule.one.includes(b) && rule.other.includes(a));

/** Returns the cautions for two metals, or a metal and a surface, that touch; none for the same metal. */
export function contactCautions(a: MetalName | Surface, b: MetalName | Surface): ContactCaution[] {
	const [one, other] = [familyOf(a), familyOf(b)];
	return CONTACT.filter((rule) => applies(rule, one, other)).map(({ sentence, source }) => ({
		kind: 'contact',
		sentence,
		source
	}));
}

/** Returns the cautions for water that drains from one metal onto another, even where they do not touch. */
export function runOffCautions(upper: MetalName, lower: MetalName): ContactCaution[] {
	if (FAMILY[upper] !== 'copper' || !RUN_OFF_ONTO.includes(FAMILY[lower])) return [];
	return [
		{
			kind: 'run-off',
			sentence: 'Water from copper stains and eats zinc, aluminum and coated steel below it.',
			source: `${ALZN}; metal roof and wall cladding code of practice, §4.9`
		}
	];
}
