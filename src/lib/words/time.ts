/** Returns a moment as the shop's clock shows it: `Nov 2, 2026, 09:00`. */
export const shopTime = (at: number, timeZone: string): string =>
	new Intl.DateTimeFormat('en-US', {
		timeZone,
		dateStyle: 'medium',
		timeStyle: 'short',
		hourCycle: 'h23'
	}).format(at);
