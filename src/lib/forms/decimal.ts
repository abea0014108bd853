/**
 * An amount typed in whole units with up to two decimals, as hundredths: `0.85` is 85. Null for anything else:
 * a comma, a sign, a third decimal are asked about, never guessed.
 */
export function parseHundredths(text: string): number | null {
	const read = /^(\d{1,7})(?:\.(\d{1,2}))?$/.exec(text.trim().replace(/^\$/, ''));
	return read ? Number(read[1]) * 100 + Number((read[2] ?? '').padEnd(2, '0')) : null;
}

/** Hundredths as typed: 85 is `0.85`. */
export const formatHundredths = (hundredths: number): string =>
	`${Math.floor(hundredths / 100)}.${String(hundredths % 100).padStart(2, '0')}`;
