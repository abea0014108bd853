import type { FreeCertificate, FreeRun } from './free-run';
import type { PackingProblem } from './plan';

/**
 * Recomputes the bound of a problem whose runs have free joints, from the problem alone, in whole numbers.
 * A pattern is any pieces and any run pieces p, least ≤ p ≤ limit, each worth v·(p − a); the table starts
 * with the pieces and is widened by one run piece at a time until nothing is worth more. Returns the bound
 * in cents, or null with a fault when the certificate proves nothing.
 */
export function checkFreeBound(
	problem: PackingProblem,
	runs: readonly FreeRun[],
	certificate: FreeCertificate
): { readonly costCents: number | null; readonly fault: string | null } {
	const no = (fault: string) => ({ costCents: null, fault });
	const { K, unit, total } = certificate;
	const numbers = [K, unit, total, ...values(certificate)];
	if (!numbers.every((n) => Number.isSafeInteger(n) && n >= 0) || K < 1 || unit < 1) {
		return no('A number of the certificate is not a whole number.');
	}
	if (!onGrid(problem, runs, unit)) return no('A length is off the grid of the certificate.');
	const u = new Map(certificate.u.map(({ length, value }) => [length as number, value]));
	const v = new Map(certificate.v.map(({ mark, value }) => [mark, value]));
	const w = new Map(certificate.w.map(({ id, value }) => [id, value]));
	if (u.size + v.size + w.size !== numbers.length - 3)
		return no('The certificate has a name twice.');
	let sum = 0n;
	for (const { length, count } of problem.pieces) sum += BigInt(count) * BigInt(u.get(length) ?? 0);
	for (const run of runs) {
		sum += BigInt(v.get(run.mark) ?? 0) * BigInt((run.total - run.overlap) / unit);
	}
	if (sum > BigInt(Number.MAX_SAFE_INTEGER))
		return no('The prices of the certificate are too large.');
	const best = widen(pieceTable(problem, u, unit), problem, runs, v, unit);
	const squaring = problem.squaring.hook + problem.squaring.far;
	const sticks = [
		...problem.stock.map((s) => ({ ...s, room: s.usable - squaring, limit: s.available })),
		...problem.offcuts.map((o) => {
			const room = o.usable - o.squaring.hook - o.squaring.far;
			return { id: o.id, room, priceCents: 0, limit: 1 as number | null };
		})
	];
	for (const { id, room, priceCents, limit } of sticks) {
		const worth = best[Math.max(0, Math.floor((room + problem.kerf) / unit))] ?? 0;
		if (!Number.isSafeInteger(worth)) return no('A pattern is worth more than can be counted.');
		const over = BigInt(worth) - BigInt(K) * BigInt(priceCents);
		if (limit === null && over > 0n) return no(`A pattern of ${id} is worth more than its price.`);
		if (limit === null) continue;
		if (over > BigInt(w.get(id) ?? 0)) return no(`The weight of ${id} is too small.`);
		sum -= BigInt(limit) * BigInt(w.get(id) ?? 0);
	}
	if (sum !== BigInt(total)) return no('The total of the certificate does not add up.');
	let step = 0n;
	for (const { priceCents } of problem.stock) step = divisor(step, BigInt(priceCents));
	if (sum <= 0n || step === 0n) return { costCents: 0, fault: null };
	const parts = BigInt(K) * step;
	return { costCents: Number(((sum + parts - 1n) / parts) * step), fault: null };
}

const values = ({ u, v, w }: FreeCertificate): number[] =>
	[...u, ...v, ...w].map((one) => one.value);

const divisor = (a: bigint, b: bigint): bigint => (b === 0n ? a : divisor(b, a % b));

function onGrid(problem: PackingProblem, runs: readonly FreeRun[], unit: number): boolean {
	const lengths = [
		problem.kerf,
		...problem.pieces.map((piece) => piece.length),
		...runs.flatMap((run) => [run.total, run.overlap, run.minPiece, run.limit])
	];
	return lengths.every((of) => of % unit === 0);
}

/** best[c] of the pieces alone, copy by copy. */
function pieceTable(
	problem: PackingProblem,
	u: ReadonlyMap<number, number>,
	unit: number
): Float64Array {
	const rooms = [...problem.stock, ...problem.offcuts].map((one) => one.usable as number);
	const best = new Float64Array(Math.floor((Math.max(0, ...rooms) + problem.kerf) / unit) + 1);
	for (const { length, count } of problem.pieces) {
		const size = (length + problem.kerf) / unit;
		const value = u.get(length) ?? 0;
		if (value === 0) continue;
		for (let copy = 0; copy < count && copy * size < best.length; copy++) {
			for (let c = best.length - 1; c >= size; c--) {
				best[c] = Math.max(best[c]!, best[c - size]! + value);
			}
		}
	}
	return best;
}

/** Adds run pieces to the table, one more in every pass, until a pass adds nothing. */
function widen(
	best: Float64Array,
	problem: PackingProblem,
	runs: readonly FreeRun[],
	v: ReadonlyMap<string, number>,
	unit: number
): Float64Array {
	const kerf = problem.kerf / unit;
	for (let changed = true; changed;) {
		changed = false;
		const before = best.slice();
		for (const run of runs) {
			const price = v.get(run.mark) ?? 0;
			const [a, least, most] = [run.overlap, run.minPiece, run.limit].map((of) => of / unit);
			if (price === 0) continue;
			for (let c = least! + kerf; c < best.length; c++) {
				for (let p = least!; p <= most! && p + kerf <= c; p++) {
					const value = before[c - p - kerf]! + price * (p - a!);
					if (value > best[c]!) {
						best[c] = value;
						changed = true;
					}
				}
			}
		}
	}
	return best;
}
