const DAY = 86_400_000;
/** After this many days a list says how old a price is. */
export const STALE_AFTER_DAYS = 90;

/** Whole days since an ISO date; null while the price is fresh. */
export function ageInDays(isoDate: string, now: number): number | null {
	const days = Math.floor((now - Date.parse(`${isoDate}T00:00:00Z`)) / DAY);
	return days > STALE_AFTER_DAYS ? days : null;
}

export const isoDay = (now: number): string => new Date(now).toISOString().slice(0, 10);
