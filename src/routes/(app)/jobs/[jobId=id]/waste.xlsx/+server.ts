import { requireContext } from '$lib/server/auth/require';
import { download, XLSX } from '$lib/server/http/download';
import { notFound } from '$lib/server/http/problem';
import { getWaste } from '$lib/server/services/waste-page';
import { wasteReportWorkbook } from '$lib/server/sheets/waste-report';
import type { RequestHandler } from './$types';

/** Where the metal of the job's releases in force goes, as a spreadsheet. */
export const GET: RequestHandler = async ({ locals, params }) => {
	const waste = getWaste(requireContext(locals), params.jobId);
	if (!waste) return notFound('waste report');
	const { shop, job, rules, revision, releasedAt, releasedBy, elevations } = waste.snapshot;
	const book = await wasteReportWorkbook({
		shop,
		job,
		rules,
		scope: `Rev ${revision}`,
		at: releasedAt,
		by: releasedBy,
		elevations: elevations.map(({ code, name }) => `${code} ${name}`.trim()),
		groups: waste.groups
	});
	return download(book, `waste ${job.number} Rev ${revision}.xlsx`, XLSX);
};
