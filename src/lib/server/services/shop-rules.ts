import { formatLength } from '../../domain/lengths/format';
import { FOOT, INCH, ZERO, multiply, type Length } from '../../domain/lengths/length';
import { parseLength } from '../../domain/lengths/parse';
import type { UnitSystem } from '../../domain/lengths/units';
import { formatHundredths, parseHundredths } from '../../forms/decimal';
import type { SettingsText } from '../../forms/settings';
import { isTimeZone } from '../../times';
import type { FieldProblem } from '../http/problem';
import type { Shop, ShopRules } from '../queries/shops';
import { describeProblem } from '../../domain/result';

const GRAMS_PER_POUND = 453.592_37;

interface LengthRule {
	readonly column: keyof ShopRules & `${string}Nm`;
	readonly label: string;
	readonly least: Length;
	readonly most: Length;
	readonly optional?: true;
}

/** The bounds only keep slips out (a kerf of a foot, a brake of an inch); the trade stays well inside them. */
export const LENGTH_RULES = {
	precision: {
		column: 'precisionNm',
		label: 'Cut precision',
		least: 10_000 as Length,
		most: INCH
	},
	kerf: { column: 'kerfNm', label: 'Kerf', least: ZERO, most: INCH },
	squaringHook: {
		column: 'squaringHookNm',
		label: 'Squaring at the hook end',
		least: ZERO,
		most: FOOT
	},
	squaringFar: {
		column: 'squaringFarNm',
		label: 'Squaring at the far end',
		least: ZERO,
		most: FOOT
	},
	minPiece: {
		column: 'minPieceNm',
		label: 'Minimum piece',
		least: INCH,
		most: multiply(FOOT, 10)
	},
	keepOffcut: {
		column: 'keepOffcutNm',
		label: 'Keep an offcut from',
		least: INCH,
		most: multiply(FOOT, 40)
	},
	brake: {
		column: 'brakeNm',
		label: 'Brake limit',
		least: FOOT,
		most: multiply(FOOT, 60),
		optional: true
	},
	shear: {
		column: 'shearNm',
		label: 'Shear limit',
		least: FOOT,
		most: multiply(FOOT, 60),
		optional: true
	},
	handling: {
		column: 'handlingNm',
		label: 'Handling limit',
		least: FOOT,
		most: multiply(FOOT, 60),
		optional: true
	}
} as const satisfies Partial<Record<keyof SettingsText, LengthRule>>;

type LengthField = keyof typeof LENGTH_RULES;
const LENGTH_FIELDS = Object.keys(LENGTH_RULES) as LengthField[];

/** The rules as a person would type them. */
export function settingsText(shop: Shop): SettingsText {
	const print = (value: Length | null) =>
		value === null ? '' : formatLength(value, { units: shop.units });
	const lengths = Object.fromEntries(
		LENGTH_FIELDS.map((field) => [field, print(shop[LENGTH_RULES[field].column])])
	) as Record<LengthField, string>;
	return {
		name: shop.name,
		timeZone: shop.timeZone,
		units: shop.units,
		...lengths,
		jointPrice: formatHundredths(shop.jointPriceCents),
		liftCaution: printWeight(shop.liftCautionGrams, shop.units)
	};
}

/** To a tenth of a pound or kilogram: finer than anybody lifts. */
function printWeight(grams: number, units: UnitSystem): string {
	const whole = units === 'imperial' ? grams / GRAMS_PER_POUND : grams / 1000;
	return String(Math.round(whole * 10) / 10);
}

export type ReadSettings =
	| { readonly ok: true; readonly rules: ShopRules }
	| { readonly ok: false; readonly problems: readonly FieldProblem[] };

/** The rules that the typed text means, or every line to check. */
export function readSettings(text: SettingsText): ReadSettings {
	const problems: FieldProblem[] = [];
	const note = (field: keyof SettingsText, label: string, accepted: string) => {
		const read = text[field] === '' ? 'nothing was entered' : `read "${text[field]}"`;
		problems.push({ field, sentence: `${label}: ${read}; accepted is ${accepted}.` });
	};
	const lengths: Partial<Record<string, Length | null>> = {};
	for (const field of LENGTH_FIELDS) {
		const read = readLength(text[field], LENGTH_RULES[field], text.units);
		if (typeof read === 'string') problems.push({ field, sentence: read });
		else lengths[LENGTH_RULES[field].column] = read;
	}
	const name = text.name.trim();
	if (name === '') note('name', 'Shop name', 'a name of up to 100 characters');
	if (!isTimeZone(text.timeZone))
		note('timeZone', 'Time zone', 'a time zone such as America/Chicago');
	const jointPriceCents = parseHundredths(text.jointPrice);
	if (jointPriceCents === null) note('jointPrice', 'Price of a joint', 'an amount such as 0.85');
	const liftCautionGrams = readWeight(text.liftCaution, text.units);
	if (liftCautionGrams === null)
		note('liftCaution', 'Lift caution', 'a weight above zero, up to 1000, such as 50');
	if (problems.length > 0) return { ok: false, problems };
	return {
		ok: true,
		rules: {
			name,
			timeZone: text.timeZone,
			units: text.units,
			jointPriceCents,
			liftCautionGrams,
			...lengths
		} as ShopRules
	};
}

/** The length; null for an optional one left empty; a sentence when it will not do. */
function readLength(text: string, rule: LengthRule, units: UnitSystem): Length | null | string {
	if (rule.optional && text.trim() === '') return null;
	const read = parseLength(text, { units, where: rule.label });
	if (!read.ok) return describeProblem(read.problem);
	if (read.value >= rule.least && read.value <= rule.most) return read.value;
	const [least, most] = [rule.least, rule.most].map((bound) => formatLength(bound, { units }));
	return `${rule.label}: read "${text}"; accepted is ${least} to ${most}.`;
}

function readWeight(text: string, units: UnitSystem): number | null {
	const hundredths = parseHundredths(text);
	if (hundredths === null || hundredths === 0 || hundredths > 100_000) return null;
	return Math.round(units === 'imperial' ? (hundredths * GRAMS_PER_POUND) / 100 : hundredths * 10);
}
