import {
	elevationSchema,
	jobCopySchema,
	jobEditForm,
	jobStateForm,
	unitSchema
} from '$lib/forms/job';
import { cornerIdForm, elevationEditForm, elevationMoveForm } from '$lib/forms/job-parts';
import { cornerSchema } from '$lib/forms/run';
import { requireContext } from '$lib/server/auth/require';
import { formAction } from '$lib/server/http/form-action';
import { notFound } from '$lib/server/http/problem';
import { copyJob } from '$lib/server/services/copy-job';
import { removeCorner, setCorner } from '$lib/server/services/corners';
import {
	addElevation,
	changeElevations,
	moveElevation,
	putUnit
} from '$lib/server/services/elevations';
import { getOverview, jobValues } from '$lib/server/services/job-overview';
import { editJob, getJobOrDeleted, moveJob, type JobMove } from '$lib/server/services/jobs';
import { redirect } from '@sveltejs/kit';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) => {
	const context = requireContext(locals);
	const job = getJobOrDeleted(context, params.jobId);
	if (!job) notFound('job');
	return { values: jobValues(job), overview: getOverview(context, job) };
};

const move = (to: JobMove) =>
	formAction(jobStateForm, (ctx, { version }, jobId) => moveJob(ctx, jobId, version, to));

export const actions: Actions = {
	edit: formAction(jobEditForm, (ctx, input, jobId) => editJob(ctx, jobId, input)),
	copy: formAction(jobCopySchema, (ctx, input, jobId) => {
		const outcome = copyJob(ctx, jobId, input);
		if (outcome.kind === 'done') redirect(303, `/jobs/${outcome.value.id}`);
		return outcome;
	}),
	archive: move('archive'),
	unarchive: move('unarchive'),
	delete: move('delete'),
	restore: move('restore'),
	addElevation: formAction(elevationSchema, (ctx, input, jobId) => addElevation(ctx, jobId, input)),
	renameElevation: formAction(elevationEditForm, (ctx, change, jobId) =>
		changeElevations(ctx, jobId, { changes: [change] })
	),
	moveElevation: formAction(elevationMoveForm, (ctx, { id, by }, jobId) =>
		moveElevation(ctx, jobId, id, by)
	),
	removeElevation: formAction(
		elevationMoveForm.pick({ id: true, version: true }),
		(ctx, row, jobId) => changeElevations(ctx, jobId, { changes: [{ ...row, deleted: true }] })
	),
	putUnit: formAction(unitSchema, (ctx, input, jobId) => putUnit(ctx, jobId, input)),
	setCorner: formAction(cornerSchema, (ctx, input, jobId) => setCorner(ctx, jobId, input)),
	removeCorner: formAction(cornerIdForm, (ctx, { id }, jobId) => removeCorner(ctx, jobId, id))
};
