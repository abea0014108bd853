import type { z } from 'zod';
import type { Problem } from '../domain/result';
import { describeProblem } from '../domain/result';
import type { UnitSystem } from '../domain/lengths/units';
import type { EditOrder, NewOrders, Receipt } from './order';
import {
	centsField,
	dateField,
	lengthField,
	typedText,
	versionField,
	wholeField,
	wordsField
} from './fields';
import { isId } from './id';

export interface FormProblem {
	readonly field: string;
	readonly sentence: string;
}
export type FormReading<T> =
	| { readonly ok: true; readonly value: T }
	| { readonly ok: false; readonly problems: readonly FormProblem[] };

/** Names of the lines of a posted form: what stands in front of each field in a refusal. */
export type Names = ReadonlyMap<string, string>;

/** Reads fields one by one and keeps what each refuses, so that all problems are told at once. */
class Reader {
	readonly problems: FormProblem[] = [];
	constructor(private readonly form: FormData) {}

	read<T>(field: string, schema: z.ZodType<T>): T {
		const read = schema.safeParse(this.form.get(field));
		if (read.success) return read.data;
		const issue = read.error.issues[0];
		const own = issue?.code === 'custom' ? (issue.params?.sentence as unknown) : undefined;
		this.problems.push({
			field,
			sentence: typeof own === 'string' ? own : `${field} was refused.`
		});
		// Never used: a reading with problems has no value.
		return undefined as T;
	}

	refuse(field: string, problem: Omit<Problem, 'kind'>): void {
		this.problems.push({ field, sentence: describeProblem({ kind: 'form.field', ...problem }) });
	}

	/** Row numbers for which the form carries an identifier, e.g. `stock.3`. */
	rows(name: string): { index: number; id: string }[] {
		return [...this.form.keys()]
			.map((key) => new RegExp(`^${name}\\.(\\d{1,3})$`).exec(key)?.[1])
			.filter((index) => index !== undefined)
			.map((index) => ({ index: Number(index), id: String(this.form.get(`${name}.${index}`)) }))
			.filter(({ id }) => isId(id));
	}

	done<T>(value: () => T): FormReading<T> {
		return this.problems.length > 0
			? { ok: false, problems: this.problems }
			: { ok: true, value: value() };
	}
}

const optionalDate = (where: string) =>
	typedText.transform((text, ctx) => {
		if (text.trim() === '') return null;
		const read = dateField(where).safeParse(text);
		if (read.success) return read.data;
		for (const issue of read.error.issues) ctx.addIssue({ ...issue, code: 'custom' } as never);
		return null;
	});

const nameOf = (names: Names, id: string): string => names.get(id) ?? 'this line';

/** What the purchaser wants of each stock length. */
export function readNewOrders(form: FormData, names: Names): FormReading<NewOrders> {
	const reader = new Reader(form);
	const lines = reader.rows('stock').map(({ index, id }) => {
		const name = nameOf(names, id);
		return {
			stockLengthId: id,
			quantity: reader.read(`quantity.${index}`, wholeField(`Lengths of ${name}`, 0, 9999)),
			spares: reader.read(`spares.${index}`, wholeField(`Spares of ${name}`, 0, 9999)),
			spareReason: reader.read(`reason.${index}`, wordsField(`Reason for spares of ${name}`, 120))
		};
	});
	reader.rows('stock').forEach(({ index, id }, at) => {
		const line = lines[at];
		if (!line || !(line.spares > 0) || line.spareReason !== '') return;
		reader.refuse(`reason.${index}`, {
			where: `Reason for spares of ${nameOf(names, id)}`,
			received: '',
			accepted: 'a reason such as damage allowance'
		});
	});
	return reader.done(() => ({ lines }));
}

/** A draft as it was edited. */
export function readEditOrder(form: FormData, names: Names): FormReading<EditOrder> {
	const reader = new Reader(form);
	const lines = reader.rows('line').map(({ index, id }) => {
		const name = nameOf(names, id);
		return {
			id,
			quantity: reader.read(`quantity.${index}`, wholeField(`Lengths of ${name}`, 0, 9999)),
			unitPriceCents: reader.read(`price.${index}`, centsField(`Price of ${name}`)),
			purpose: reader.read(`purpose.${index}`, wordsField(`Purpose of ${name}`, 200))
		};
	});
	const head = {
		version: reader.read('version', versionField),
		needBy: reader.read('needBy', optionalDate('Need by')),
		deliverTo: reader.read('deliverTo', wordsField('Deliver to', 300)),
		note: reader.read('note', wordsField('Note', 1000)),
		freightCents: reader.read('freight', centsField('Freight'))
	};
	return reader.done(() => ({ ...head, lines }));
}

/** One delivery as it was checked off. */
export function readReceipt(form: FormData, names: Names, units: UnitSystem): FormReading<Receipt> {
	const reader = new Reader(form);
	const lines = reader.rows('line').map(({ index, id }) => {
		const name = nameOf(names, id);
		const received = reader.read(`received.${index}`, wholeField(`Arrived of ${name}`, 0, 9999));
		const damaged = reader.read(`damaged.${index}`, wholeField(`Damaged of ${name}`, 0, 9999));
		if (damaged > received)
			reader.refuse(`damaged.${index}`, {
				where: `Damaged of ${name}`,
				received: String(damaged),
				accepted: `at most the ${received} that arrived`
			});
		return {
			orderLineId: id,
			received,
			damaged,
			batch: reader.read(`batch.${index}`, wordsField(`Batch of ${name}`, 60)),
			actualNm: reader.read(`actual.${index}`, lengthField(`Measured length of ${name}`, units)),
			place: reader.read(`place.${index}`, wordsField(`Place of ${name}`, 60))
		};
	});
	const opId = String(form.get('opId'));
	if (!isId(opId))
		reader.refuse('opId', { where: 'This form', received: opId, accepted: 'one loaded afresh' });
	const note = reader.read('note', wordsField('Note', 1000));
	return reader.done(() => ({ opId, note, lines }));
}

/** What was typed, to be shown again. */
export const typedFields = (form: FormData): Record<string, string> =>
	Object.fromEntries([...form].filter(([, value]) => typeof value === 'string')) as Record<
		string,
		string
	>;
