import type { UnitSystem } from './units';

/** How a length field reads what is typed into it. */
export interface LengthReading {
	/** The job's system: what a bare number means. */
	readonly units: UnitSystem;
	/** The field or row, in the person's words; begins the sentence of a problem. */
	readonly where: string;
	/** Whether a comma may be the decimal mark; by default in metric jobs and before a metric unit. */
	readonly decimalComma?: boolean;
	/** Which values the field takes; `not-negative` unless said otherwise. */
	readonly range?: 'positive' | 'not-negative' | 'any';
}
