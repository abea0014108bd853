import type { Column } from '../forms/run-cells';

/** A column of a takeoff sheet: a column of the grid, or the elevation that the grid shows as tabs. */
export type Header = Column | 'elevation';

/** Names under which estimators keep these columns, in plain lower-case words. */
const NAMES: Readonly<Record<Header, string>> = {
	elevation: 'elevation, elev, side, facade, wall',
	mark: 'mark, run, run mark, run no, id, tag, item',
	unit: 'unit, canopy, opening, unit mark, canopy mark, awning',
	profile: 'profile, trim, shape, type, section, flashing',
	material: 'material, metal, finish, colour, color, gauge, metal finish',
	face: 'face, face length, length, run length, len, measure, dimension, size',
	count: 'count, qty, quantity, no, number, pcs, each, ea',
	left: 'left, left end, lh, lh end, end left, start',
	right: 'right, right end, rh, rh end, end right',
	choice: 'joints, joint, joint choice, division, splits',
	lap: 'lap, overlap, lap length',
	keepOut: 'keep out, keep outs, no joint, avoid',
	fit: 'fit',
	source: 'source, length source, measured from, basis',
	hold: 'hold, status, verified, field verify',
	scope: 'scope, by, furnished by',
	note: 'note, notes, remark, remarks, comment, comments, description, location'
};

const plain = (text: string) =>
	text
		.toLowerCase()
		.replace(/\(.*?\)/g, ' ')
		.replace(/[^a-z0-9]+/g, ' ')
		.trim();

const BY_NAME = new Map(
	Object.entries(NAMES).flatMap(([header, names]) =>
		names.split(', ').map((name) => [name, header as Header] as const)
	)
);

/** Which column each heading names; each column at most once, the first heading that names it wins. */
export function recogniseHeaders(headings: readonly string[]): (Header | null)[] {
	const taken = new Set<Header>();
	return headings.map((heading) => {
		const header = BY_NAME.get(plain(heading)) ?? null;
		if (!header || taken.has(header)) return null;
		taken.add(header);
		return header;
	});
}

/** Whether a row reads as headings: at least two columns named, and no cell but headings of some kind. */
export function isHeaderRow(cells: readonly string[]): boolean {
	const known = recogniseHeaders(cells).filter(Boolean).length;
	const filled = cells.filter((cell) => cell.trim() !== '').length;
	return known >= 2 && known * 2 >= filled;
}
