/**
 * Marks: elevation letter and run number, then the piece's place from the left as seen from outside:
 * `N03-2`. Further copies of the same run carry their number: `N03.2-2`. Letters that are taken for a digit
 * in a shop's light (I, O, Q, S, Z) make a mark unclear.
 */
const CLEAR = /^[A-HJ-NPRT-Y]{1,3}\d{1,4}(?:\.\d{1,3})?(?:-[A-HJ-NPRT-Y]?\d{0,3})?$/;

/** Whether a run or piece mark can be read without doubt: clear letters first, then digits. */
export const isClearMark = (mark: string): boolean => CLEAR.test(mark);

/** Returns the mark of one copy of a run: the first keeps the run's own. */
export const copyMark = (runMark: string, copy: number): string =>
	copy === 1 ? runMark : `${runMark}.${copy}`;
