import type { Length } from '../../domain/lengths/length';
import { parseLength } from '../../domain/lengths/parse';
import type { UnitSystem } from '../../domain/lengths/units';
import type { Problem } from '../../domain/result';
import { fieldProblem, type FieldProblem } from '../http/problem';

/** Reads typed values one after another and gathers what is wrong with each. */
export class TypedReader {
	readonly problems: FieldProblem[] = [];
	constructor(readonly units: UnitSystem) {}

	refuse(field: string, problem: Omit<Problem, 'kind'>): null {
		this.problems.push(fieldProblem(field, { kind: `read.${field}`, ...problem }));
		return null;
	}

	/** A length, or null when nothing was typed. */
	length(
		field: string,
		where: string,
		typed: string,
		range: 'positive' | 'not-negative' = 'not-negative'
	): Length | null {
		if (typed.trim() === '') return null;
		const read = parseLength(typed, { units: this.units, where, range });
		if (read.ok) return read.value;
		this.problems.push(fieldProblem(field, read.problem));
		return null;
	}

	/** A percentage such as `7.5` or `7.5 %` in hundredths of a percent; 0 to 100. */
	basisPoints(field: string, where: string, typed: string): number {
		const text = typed.replace(/%\s*$/, '').trim().replace(',', '.');
		const value = /^\d{1,3}(\.\d{1,2})?$/.test(text) ? Math.round(Number(text) * 100) : -1;
		if (value >= 0 && value <= 10_000) return value;
		this.refuse(field, {
			where,
			received: typed,
			accepted: 'a percentage from 0 to 100, e.g. 7.5'
		});
		return 0;
	}
}
