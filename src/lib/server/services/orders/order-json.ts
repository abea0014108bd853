import type { z } from 'zod';
import type { orderAnswer } from '../../../forms/order';
import type { OrderView } from './read-order';

/** The order as the API documents it: nothing that the document does not name. */
export const orderJson = ({ order, lines, money }: OrderView): z.output<typeof orderAnswer> => ({
	id: order.id,
	number: order.number,
	state: order.state,
	version: order.version,
	supplier: { name: order.supplierName, email: order.supplierEmail },
	needBy: order.needBy,
	deliverTo: order.deliverTo,
	note: order.note,
	goodsCents: money?.goodsCents ?? null,
	freightCents: money?.freightCents ?? null,
	totalCents: money?.totalCents ?? null,
	lines: lines.map((line) => ({
		id: line.id,
		stockLengthId: line.stockLengthId,
		profileCode: line.profileCode,
		materialCode: line.materialCode,
		colourCode: line.colourCode,
		nominalNm: line.nominalNm,
		usableNm: line.usableNm,
		quantity: line.quantity,
		good: line.good,
		unitPriceCents: line.unitPriceCents,
		lineCents: line.lineCents,
		purpose: line.purpose
	}))
});
