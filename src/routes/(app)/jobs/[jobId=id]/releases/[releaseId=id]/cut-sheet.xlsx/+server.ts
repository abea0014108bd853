import { requireContext } from '$lib/server/auth/require';
import { download, XLSX } from '$lib/server/http/download';
import { notFound } from '$lib/server/http/problem';
import { getRelease } from '$lib/server/services/release-page';
import { cutSheetWorkbook } from '$lib/server/sheets/cut-sheet';
import type { RequestHandler } from './$types';

/** The cut sheet of a release as a spreadsheet. */
export const GET: RequestHandler = async ({ locals, params }) => {
	const found = getRelease(requireContext(locals), params.jobId, params.releaseId);
	if (!found) return notFound('release');
	const { job, revision } = found.snapshot;
	const name = ['cut sheet', job.number, revision && `Rev ${revision}`].filter(Boolean).join(' ');
	return download(await cutSheetWorkbook(found.snapshot), `${name}.xlsx`, XLSX);
};
