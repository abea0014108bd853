import { length, type Length } from '../lengths/length';
import type {
	Impossible,
	PackingPlan,
	PackingProblem,
	PlanBound,
	PlannedCut,
	PlanReason,
	PlannedStick
} from '../plan/plan';
import type { ProvenBound } from './certificate';
import type { Model, Source } from './model';
import { costOf, type Use } from './pattern';

/** Where the pieces of one item stand: handed out in the order in which they were asked for. */
type Dispenser = (item: number) => { readonly id: string; readonly mark: string };

/** Makes sticks with running marks out of patterns; every piece gets its own id and mark. */
export function buildSticks(model: Model, uses: readonly Use[]): PlannedStick[] {
	const nextPiece = dispenser(model);
	const spent = model.bins.map(() => 0);
	return uses.flatMap((use) =>
		Array.from({ length: use.times }, () => {
			const bin = model.bins[use.pattern.bin]!;
			const source = bin.sources[spent[use.pattern.bin]!++ % bin.sources.length]!;
			return buildStick(model, use, source, nextPiece);
		})
	);
}

function buildStick(model: Model, use: Use, source: Source, nextPiece: Dispenser): PlannedStick {
	const cuts: PlannedCut[] = [];
	let at = 0;
	use.pattern.items.forEach((item, n) => {
		for (let copy = 0; copy < use.pattern.counts[n]!; copy++) {
			const { id, mark } = nextPiece(item);
			const cut = model.items[item]!.length;
			cuts.push({ pieceId: id, mark, length: cut, at: length(at) });
			at += cut + model.kerf;
		}
	});
	return {
		source: { kind: source.kind, id: source.id },
		nominal: source.nominal,
		usable: source.usable,
		cuts,
		left: length(Math.max(0, source.room - at)) as Length
	};
}

function dispenser(model: Model): Dispenser {
	const cursor = model.items.map(() => ({ piece: 0, taken: 0 }));
	return (item) => {
		const where = cursor[item]!;
		const pieces = model.items[item]!.pieces;
		if (where.taken >= pieces[where.piece]!.count) {
			where.piece++;
			where.taken = 0;
		}
		where.taken++;
		return pieces[where.piece]!;
	};
}

/** The bound of a plan as data; in lengths too where all stock has one price. */
export function planBound(
	problem: PackingProblem,
	costCents: number,
	proof: PlanBound['proof'],
	proven: ProvenBound | null
): PlanBound {
	const prices = new Set(problem.stock.map((stock) => stock.priceCents));
	const [price] = [...prices];
	const lengths = prices.size === 1 && price! > 0 ? Math.ceil(costCents / price!) : null;
	const certificate = proven?.certificate ?? null;
	const tree = proof === 'tree' ? { tree: proven!.tree! } : {};
	return { costCents, lengths, proof, certificate, ...tree };
}

/** An answer without a plan. */
export function noPlan(
	problem: PackingProblem,
	status: 'impossible' | 'stopped',
	impossible: readonly Impossible[],
	proven: ProvenBound | null = null
): PackingPlan {
	const bound = planBound(problem, proven?.costCents ?? 0, proven ? 'certificate' : 'none', proven);
	return { status, sticks: [], costCents: 0, bound, impossible };
}

/** The plan of some uses with the best bound known. */
export function buildPlan(
	problem: PackingProblem,
	model: Model,
	uses: readonly Use[],
	proven: ProvenBound | null,
	reason: PlanReason
): PackingPlan {
	const costCents = costOf(model, uses);
	const sticks = buildSticks(model, uses);
	const closed = proven !== null && proven.costCents >= costCents;
	if (closed || reason === 'search') {
		const proof = closed ? (proven.tree ? 'tree' : 'certificate') : 'search';
		const bound = planBound(problem, costCents, proof, proven);
		const status = closed ? 'proven' : 'best found';
		return closed
			? { status, sticks, costCents, bound, impossible: [] }
			: { status, reason, sticks, costCents, bound, impossible: [] };
	}
	const bound = planBound(problem, proven?.costCents ?? 0, proven ? 'certificate' : 'none', proven);
	return { status: 'best found', reason, sticks, costCents, bound, impossible: [] };
}
