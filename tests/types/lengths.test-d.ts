/** Calls that must not compile; checked by the ordinary type check, no runner needed. */
import { add, inches, length, multiply, type Length } from '../../src/lib/domain/lengths/length';
import { formatLength } from '../../src/lib/domain/lengths/format';
import { parseLength } from '../../src/lib/domain/lengths/parse';
import { roundDownTo } from '../../src/lib/domain/lengths/round';

const stick: Length = inches(120);

// @ts-expect-error a bare number is no length: 120 of what?
export const bare: Length = 120;
// @ts-expect-error a sum of a length and a number has lost its unit
export const sum: Length = stick + 3;
// @ts-expect-error even a sum of two lengths goes through `add`, which checks it
export const raw: Length = stick + stick;
// @ts-expect-error division names its rounding: use round.ts
export const half: Length = stick / 2;
// @ts-expect-error a length and cents do not add
export const mixed = add(stick, 995);
// @ts-expect-error a grid is a length
export const floored = roundDownTo(stick, 16);
// @ts-expect-error text is parsed at the edge
export const typed: Length = '10 ft';
// @ts-expect-error a field's name is part of every reading
export const unnamed = parseLength('10 ft', { units: 'imperial' });
// @ts-expect-error the system is imperial or metric
export const system = formatLength(stick, { units: 'feet' });

export const allowed: readonly Length[] = [length(120), add(stick, stick), multiply(stick, 3)];
