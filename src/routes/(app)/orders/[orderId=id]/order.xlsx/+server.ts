import { may, requireContext } from '$lib/server/auth/require';
import { download, XLSX } from '$lib/server/http/download';
import { notFound } from '$lib/server/http/problem';
import { orderPaper } from '$lib/server/services/orders/order-paper';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async ({ locals, params }) => {
	const context = requireContext(locals);
	// The sheet is priced throughout: without the right to read prices there is none.
	if (!may(context, 'prices.read')) notFound('sheet');
	const paper = orderPaper(context, params.orderId) ?? notFound('order');
	return download(await paper.workbook(), paper.filename, XLSX);
};
