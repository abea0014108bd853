import { requireContext } from '$lib/server/auth/require';
import { download, XLSX } from '$lib/server/http/download';
import { notFound } from '$lib/server/http/problem';
import { snapshotOf } from '$lib/server/services/trim-sheet';
import { trimListWorkbook } from '$lib/server/sheets/trim-list';
import type { RequestHandler } from './$types';

/** The field trim list of a release as a spreadsheet. */
export const GET: RequestHandler = async ({ locals, params }) => {
	const snapshot = snapshotOf(requireContext(locals), params.jobId, params.releaseId);
	if (!snapshot) return notFound('release');
	const { job, revision } = snapshot;
	const name = ['trim list', job.number, revision && `Rev ${revision}`].filter(Boolean).join(' ');
	return download(await trimListWorkbook(snapshot), `${name}.xlsx`, XLSX);
};
