/** What happens where a run stops. Left and right are always as seen from outside, facing the wall. */
export const END_KINDS = [
	'open',
	'closed',
	'end-dam',
	'corner-outside',
	'corner-inside',
	'butt',
	'laps-next'
] as const;
export type EndKind = (typeof END_KINDS)[number];

/** How a closed end is closed: folded from the piece's own metal, by a return piece, or by an end cap. */
export const CLOSURES = ['folded', 'return', 'cap'] as const;
export type Closure = (typeof CLOSURES)[number];
