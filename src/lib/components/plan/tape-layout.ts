import { formatLength } from '$lib/domain/lengths/format';
import { FOOT, INCH, length, MILLIMETRE } from '$lib/domain/lengths/length';
import type { UnitSystem } from '$lib/domain/lengths/units';
import type { StickView } from '$lib/domain/plan/view';

/** Drawing units: the whole tape is `width` wide; a gutter on the left carries the stick's number. */
export interface TapeSpace {
	readonly width: number;
	readonly units: UnitSystem;
	/** Length that fills the width, so that all tapes of a group share one scale. */
	readonly longestNm: number;
	readonly rows: boolean;
}

export const GUTTER = 64;
export const TICKS_H = 16;
export const BAR_H = 40;
const CALLOUT_H = 15;
const MARK_H = 14;
/** Advance of one figure of the mark's type at 12 units. */
const GLYPH = 7.3;

export interface Label {
	readonly x: number;
	readonly y: number;
	readonly text: string;
}
export interface Box {
	readonly x: number;
	readonly width: number;
}
export interface PieceBox extends Box {
	readonly lengthLabel: Label | null;
	readonly markLabel: Label | null;
	/** Written above the tape, with a line down to a piece too narrow for its words. */
	readonly callout: (Label & { readonly to: number }) | null;
}
export interface Tape {
	readonly height: number;
	readonly top: number;
	readonly end: number;
	readonly ticks: readonly { readonly rank: number; readonly path: string }[];
	readonly pieces: readonly PieceBox[];
	readonly squaring: readonly Box[];
	readonly left: (Box & { readonly label: Label | null }) | null;
	/** Running marks below the tape, each with a line from the cut. */
	readonly marks: readonly (Label & { readonly level: number })[];
	/** Marks of each stick when several are cut alike. */
	readonly rows: readonly {
		readonly y: number;
		readonly number: number;
		readonly labels: readonly Label[];
	}[];
}

const textWidth = (text: string): number => text.length * GLYPH;
/** A kerf is drawn as a gap that can be seen, whatever the scale. */
const LEAST_GAP = 3;
const round = (value: number): number => Math.round(value * 10) / 10;

/** Tick ranks from strong to fine, in nanometres; finer than `least` units apart are left out. */
function ranksOf(units: UnitSystem, perUnit: number): number[] {
	const ranks =
		units === 'imperial'
			? [FOOT, FOOT / 2, INCH * 3, INCH]
			: [MILLIMETRE * 1000, MILLIMETRE * 500, MILLIMETRE * 100, MILLIMETRE * 50];
	return ranks.filter((step) => step * perUnit >= 4);
}

function ticksOf(from: number, to: number, perUnit: number, units: UnitSystem, top: number) {
	const ranks = ranksOf(units, perUnit);
	const taken = new Set<number>();
	return ranks.map((step, rank) => {
		const size = TICKS_H - rank * 4;
		let path = '';
		for (let at = 0; at <= to - from; at += step) {
			if (taken.has(at)) continue;
			taken.add(at);
			path += `M${round(GUTTER + (from + at) * perUnit)} ${top}v-${size}`;
		}
		return { rank, path };
	});
}

/** Everything of one tape, in drawing units; `sticks` are cut alike and drawn once. */
export function layoutTape(sticks: readonly StickView[], space: TapeSpace): Tape {
	const [stick] = sticks;
	const perUnit = (space.width - GUTTER - 2) / space.longestNm;
	const x = (nm: number) => round(GUTTER + nm * perUnit);
	const hook = stick!.squaringHookNm;
	const names = callouts(stick!, sticks.length, space.units, perUnit, hook);
	const lift = names.some((one) => one?.level === 1) ? 2 : names.some(Boolean) ? 1 : 0;
	const top = 2 + lift * CALLOUT_H + TICKS_H;
	const pieces = stick!.cuts.map((cut, i): PieceBox => {
		const at = x(hook + cut.atNm);
		const gap = Math.max(0, LEAST_GAP - stick!.kerfNm * perUnit);
		const width = round(Math.max(2, cut.lengthNm * perUnit - gap));
		const name = names[i];
		const middle = round(at + width / 2);
		if (name) {
			const y = top - TICKS_H - 3 - (lift - 1 - name.level) * CALLOUT_H;
			return {
				x: at,
				width,
				lengthLabel: null,
				markLabel: null,
				callout: { x: middle, y, text: name.text, to: top }
			};
		}
		const one = sticks.length === 1;
		return {
			x: at,
			width,
			callout: null,
			lengthLabel: { x: middle, y: top + (one ? 32 : 25), text: sizeOf(cut.lengthNm, space.units) },
			markLabel: one ? { x: middle, y: top + 15, text: cut.mark } : null
		};
	});
	const marks = runningMarks(stick!, space.units, x, hook, top + BAR_H);
	const under = top + BAR_H + (marks.some((mark) => mark.level === 1) ? 2 : 1) * MARK_H + 4;
	const rows = sticks.length === 1 || !space.rows ? [] : rowsOf(sticks, pieces, under);
	return {
		height: round(under + rows.length * MARK_H + 2),
		top,
		end: x(stick!.usableNm),
		ticks: ticksOf(hook, stick!.usableNm, perUnit, space.units, top),
		pieces,
		squaring: [
			{ x: x(0), width: round(hook * perUnit) },
			{
				x: x(stick!.usableNm - stick!.squaringFarNm),
				width: round(stick!.squaringFarNm * perUnit)
			}
		].filter((box) => box.width > 0),
		left: leftBox(stick!, space.units, perUnit, x, top),
		marks,
		rows
	};
}

const sizeOf = (nm: number, units: UnitSystem): string =>
	formatLength(length(nm), { units, style: 'prime' });

/** Words of the pieces too narrow to carry them, on one of two levels so that neighbours stay apart. */
function callouts(
	stick: StickView,
	count: number,
	units: UnitSystem,
	perUnit: number,
	hook: number
): ({ text: string; level: number } | null)[] {
	const ends = [-Infinity, -Infinity];
	return stick.cuts.map((cut) => {
		const size = sizeOf(cut.lengthNm, units);
		const words = count === 1 ? [cut.mark, size] : [size];
		if (Math.max(...words.map(textWidth)) + 4 <= cut.lengthNm * perUnit) return null;
		const text = count === 1 ? `${cut.mark} ${size}` : size;
		const from = GUTTER + (hook + cut.atNm + cut.lengthNm / 2) * perUnit - textWidth(text) / 2;
		const level = from > ends[0]! + 6 ? 0 : 1;
		ends[level] = from + textWidth(text);
		return { text, level };
	});
}

/** Where every piece ends, measured from the squared hook end; crowded ones step down a level. */
function runningMarks(
	stick: StickView,
	units: UnitSystem,
	x: (nm: number) => number,
	hook: number,
	below: number
): Tape['marks'] {
	const ends = [-Infinity, -Infinity];
	return stick.cuts.map((cut) => {
		const text = sizeOf(cut.atNm + cut.lengthNm, units);
		const at = x(hook + cut.atNm + cut.lengthNm);
		const from = at - textWidth(text);
		const level = from > ends[0]! + 4 ? 0 : 1;
		ends[level] = at;
		return { x: at, y: below + (level + 1) * MARK_H, text, level };
	});
}

function leftBox(
	stick: StickView,
	units: UnitSystem,
	perUnit: number,
	x: (nm: number) => number,
	top: number
): Tape['left'] {
	if (stick.leftNm <= 0) return null;
	const start = stick.usableNm - stick.squaringFarNm - stick.leftNm;
	const width = round(stick.leftNm * perUnit);
	const text = sizeOf(stick.leftNm, units);
	const fits = textWidth(text) + 4 <= width;
	return {
		x: x(start),
		width,
		label: fits ? { x: round(x(start) + width / 2), y: top + 25, text } : null
	};
}

/** A row of marks for each stick; a mark too wide for its piece stands in the table only. */
const rowsOf = (
	sticks: readonly StickView[],
	pieces: readonly PieceBox[],
	from: number
): Tape['rows'] =>
	sticks.map((stick, i) => ({
		y: from + (i + 1) * MARK_H - 3,
		number: stick.number,
		labels: stick.cuts.flatMap((cut, n) =>
			textWidth(cut.mark) <= pieces[n]!.width + 4
				? [{ x: round(pieces[n]!.x + pieces[n]!.width / 2), y: 0, text: cut.mark }]
				: []
		)
	}));
