import { groupFigures, runFigures, standardStick, type BidRun } from '../../domain/bid/figures';
import { formatLength } from '../../domain/lengths/format';
import { describeProblem } from '../../domain/result';
import type { Context } from '../context';
import { may } from '../auth/require';
import type { Job } from '../queries/jobs';
import { getTakeoff, type Takeoff } from './takeoff';

/** What the form of a job shows: lengths as text in the job's units. */
export function jobValues(job: Job): Record<string, string> {
	const write = (of: Job['kerfNm'] | null) =>
		of === null ? '' : formatLength(of, { units: job.units });
	return {
		number: job.number,
		name: job.name,
		customer: job.customer,
		customerReference: job.customerReference,
		site: job.site,
		units: job.units,
		dueOn: job.dueOn ?? '',
		wasteAllowance: String(job.wasteAllowanceBp / 100),
		kerf: write(job.kerfNm),
		squaringHook: write(job.squaringHookNm),
		squaringFar: write(job.squaringFarNm),
		minPiece: write(job.minPieceNm),
		specLimit: write(job.specLimitNm),
		version: String(job.version)
	};
}

/** Totals of a job: per elevation, and per profile and material with the lengths needed. */
export function getOverview(ctx: Context, job: Job) {
	const takeoff = getTakeoff(ctx, job);
	const prices = may(ctx, 'prices.read');
	const ours = takeoff.runs.filter((run) => run.scope === 'us');
	return {
		elevations: takeoff.elevations.map(({ id, code, name, version }) => {
			const here = takeoff.runs.filter((run) => run.elevationId === id);
			return {
				id,
				code,
				name,
				version,
				runs: here.length,
				holds: here.filter((run) => run.hold && run.scope === 'us').length,
				units: takeoff.unitMarks.filter((unit) => unit.elevationId === id).map((unit) => unit.mark)
			};
		}),
		units: takeoff.unitMarks.map(
			({ id, elevationId, mark, name, widthNm, projectionNm, heightNm }) => ({
				id,
				elevationId,
				mark,
				name,
				widthNm,
				projectionNm,
				heightNm
			})
		),
		runs: takeoff.runs.map(({ id, mark, elevationId }) => ({ id, mark, elevationId })),
		corners: takeoff.corners.map(({ id, leftRunId, rightRunId, kind, turn, carries, plane }) => ({
			id,
			leftRunId,
			rightRunId,
			kind,
			turn,
			carries,
			plane
		})),
		holds: ours.filter((run) => run.hold).length,
		byOthers: takeoff.runs.length - ours.length,
		groups: groupsOf(takeoff, ours, prices)
	};
}

function groupsOf(takeoff: Takeoff, ours: readonly BidRun[], prices: boolean) {
	const keys = [...new Set(ours.map((run) => `${run.profileId} ${run.materialId}`))];
	return keys.map((key) => {
		const [profileId, materialId] = key.split(' ') as [string, string];
		const profile = takeoff.profiles.find((one) => one.id === profileId)!;
		const material = takeoff.materials.find((one) => one.id === materialId)!;
		const stock = takeoff.stock.filter(
			(one) => one.profileId === profileId && one.materialId === materialId
		);
		const stick = standardStick(stock);
		const divided = ours
			.filter((run) => run.profileId === profileId && run.materialId === materialId)
			.map((run) => runFigures(run, profile, takeoff.rules, stick));
		const figures = divided.flatMap((one) => (one.ok ? [one.value] : []));
		const { estimate, ...totals } = groupFigures(figures, stock, takeoff.rules);
		return {
			key,
			profile: `${profile.code} ${profile.name}`,
			material: material.code,
			...totals,
			lengths: estimate.lengths,
			costCents: prices ? estimate.costCents : null,
			proven: estimate.proven,
			problems: divided.flatMap((one) => (one.ok ? [] : [describeProblem(one.problem)]))
		};
	});
}
