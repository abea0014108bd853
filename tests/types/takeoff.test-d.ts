/** Runs that must not compile; checked by the ordinary type check, no runner needed. */
import { inches, ZERO } from '../../src/lib/domain/lengths/length';
import type { Joint, RunEnd, RunToDivide } from '../../src/lib/domain/takeoff/takeoff';
import { divideRun } from '../../src/lib/domain/takeoff/divide';

export const open: RunEnd = { kind: 'open', allowance: ZERO };

// @ts-expect-error an end kind is one of the trade's words
export const odd: RunEnd = { kind: 'sealed', allowance: ZERO };
// @ts-expect-error an allowance is a length
export const bare: RunEnd = { kind: 'closed', allowance: 3 };
// @ts-expect-error a lap has an overlap, not a gap
export const lap: Joint = { kind: 'lap', gap: inches(1) };
// @ts-expect-error a plate needs its own length
export const plate: Joint = { kind: 'plate', gap: inches(1) };

declare const run: RunToDivide;
// @ts-expect-error nothing of a run is changed in place
run.face = inches(1);

const result = divideRun(run);
// @ts-expect-error a result is asked whether it is ok before its value is used
export const pieces = result.value.pieces;
