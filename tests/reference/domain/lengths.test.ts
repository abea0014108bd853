import { expect, it } from 'vitest';
import { FOOT, INCH, SIXTEENTH, SIXTY_FOURTH } from '../../../src/lib/domain/lengths/length';
import { formatInches } from '../../../src/lib/domain/lengths/format';
import { parseLength } from '../../../src/lib/domain/lengths/parse';
import { inchesOf, referenceTable } from '../../support/reference';

// Source: reference/units/definitions.source.md (1959 agreement; exact definitions).
it('LEN-1: the marks of a tape are the defined number of nanometres', () => {
	const units = new Map(
		referenceTable('units/definitions.csv').map((r) => [r.quantity, Number(r.value)])
	);
	expect(INCH).toBe(units.get('inch'));
	expect(FOOT).toBe(units.get('foot'));
	expect(SIXTEENTH).toBe(units.get('sixteenth of an inch'));
	expect(SIXTY_FOURTH).toBe(units.get('sixty-fourth of an inch'));
	expect(INCH / 1000).toBe(units.get('thousandth of an inch'));
	expect(INCH / 2540).toBe(units.get('hundredth of a millimetre'));
});

// Source: reference/lengths/readings.source.md (computed by hand from feet, inches and fractions).
it.each(referenceTable('lengths/readings.csv'))(
	'LEN-2: $text is $inches in',
	({ text, inches }) => {
		const read = parseLength(text!, { units: 'imperial', where: 'reading' });
		expect(read).toEqual({ ok: true, value: inchesOf(inches!) });
		const back = parseLength(formatInches(inchesOf(inches!)), {
			units: 'imperial',
			where: 'reading'
		});
		expect(back).toEqual(read);
	}
);
