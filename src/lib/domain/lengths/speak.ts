import { formatLength, lengthParts, type LengthParts } from './format';
import { MILLIMETRE, type Length } from './length';
import type { UnitSystem } from './units';

const PART_NAMES: Readonly<Record<number, readonly [one: string, many: string]>> = {
	2: ['half', 'halves'],
	4: ['quarter', 'quarters'],
	8: ['eighth', 'eighths'],
	16: ['sixteenth', 'sixteenths'],
	32: ['thirty-second', 'thirty-seconds'],
	64: ['sixty-fourth', 'sixty-fourths']
};

const counted = (count: number, one: string, many: string) =>
	`${count} ${count === 1 ? one : many}`;

function speakFraction({ over, under }: NonNullable<LengthParts['fraction']>): string {
	const [one, many] = PART_NAMES[under]!;
	return counted(over, one, many);
}

function speakInches(inches: number, fraction: LengthParts['fraction']): string {
	if (!fraction) return counted(inches, 'inch', 'inches');
	if (inches === 0) return `${speakFraction(fraction)} of an inch`;
	return `${inches} and ${speakFraction(fraction)} inches`;
}

function speakMetric(of: Length): string {
	const digits = formatLength(of, { units: 'metric' }).replace(/^-/, '').replace(/ mm$/, '');
	return `${digits} ${Math.abs(of) === MILLIMETRE ? 'millimetre' : 'millimetres'}`;
}

function speakImperial(of: Length): string {
	const { feet, inches, fraction, residue } = lengthParts(of);
	const said = [
		feet > 0 ? counted(feet, 'foot', 'feet') : '',
		feet === 0 || inches > 0 || fraction ? speakInches(inches, fraction) : ''
	];
	const rest = residue === 0 ? '' : ` plus ${speakMetric(residue)}`;
	return `${said.filter(Boolean).join(' ')}${rest}`;
}

/** Returns a length as a screen reader should say it: `8 feet 4 and 3 eighths inches`, `2549.5 millimetres`. */
export function speakLength(of: Length, units: UnitSystem): string {
	const said = units === 'metric' ? speakMetric(of) : speakImperial(of);
	return of < 0 ? `minus ${said}` : said;
}
