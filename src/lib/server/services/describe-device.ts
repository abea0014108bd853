const SYSTEMS: readonly (readonly [RegExp, string])[] = [
	[/iPhone|iPad/, 'iPhone or iPad'],
	[/Android/, 'Android'],
	[/Windows/, 'Windows'],
	[/Mac OS X/, 'Mac'],
	[/CrOS/, 'Chromebook'],
	[/Linux/, 'Linux']
];
const BROWSERS: readonly (readonly [RegExp, string])[] = [
	[/Edg\//, 'Edge'],
	[/Firefox\//, 'Firefox'],
	[/Chrome\/|CriOS\//, 'Chrome'],
	[/Safari\//, 'Safari']
];

const firstOf = (list: typeof SYSTEMS, text: string): string | undefined =>
	list.find(([pattern]) => pattern.test(text))?.[1];

/** A browser's name for itself, in words a person recognises: `Firefox on Windows`. */
export function describeDevice(userAgent: string): string {
	const browser = firstOf(BROWSERS, userAgent);
	const system = firstOf(SYSTEMS, userAgent);
	if (browser && system) return `${browser} on ${system}`;
	return browser ?? system ?? 'Unknown device';
}
