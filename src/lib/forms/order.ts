import { z } from 'zod';
import { isId } from './id';

const id = z.string().refine(isId, 'accepted is an identifier of 22 characters');
const lengths = (least: number) =>
	z
		.int('accepted is a whole number')
		.min(least, `accepted is ${least} or more`)
		.max(9999, 'accepted is at most 9999');
const words = (most: number) =>
	z.string('accepted is text').trim().max(most, `accepted is at most ${most} characters`);
const isoDate = z.iso.date('accepted is a date such as 2026-03-31');
const cents = z
	.int('accepted is whole cents')
	.min(0, 'accepted is 0 or more')
	.max(1_000_000_000, 'accepted is at most 1000000000');
const nanometres = z
	.int('accepted is whole nanometres')
	.min(1, 'accepted is more than 0')
	.max(1_000_000_000_000, 'accepted is at most 1 km');

/** Draft orders from stock lengths, one per supplier. */
export const newOrdersBody = z
	.strictObject({
		lines: z
			.array(
				z.strictObject({
					stockLengthId: id,
					quantity: lengths(0),
					spares: lengths(0).default(0),
					spareReason: words(120).default('')
				})
			)
			.min(1, 'accepted is at least one line')
			.max(200, 'accepted are at most 200 lines')
			.refine((lines) => new Set(lines.map((one) => one.stockLengthId)).size === lines.length, {
				message: 'accepted is each stock length once'
			})
	})
	.meta({ description: 'Lengths to order; lines of one supplier become one draft order.' });
export type NewOrders = z.output<typeof newOrdersBody>;

/** A draft as the purchaser wants it; quantity 0 takes a line off. */
export const editOrderBody = z.strictObject({
	version: z.int(),
	needBy: isoDate.nullable(),
	deliverTo: words(300),
	note: words(1000),
	freightCents: cents,
	lines: z
		.array(
			z.strictObject({
				id,
				quantity: lengths(0),
				unitPriceCents: cents,
				purpose: words(200)
			})
		)
		.max(200, 'accepted are at most 200 lines')
});
export type EditOrder = z.output<typeof editOrderBody>;

export const sendOrderBody = z
	.strictObject({ version: z.int('accepted is the version that was read') })
	.meta({
		description: 'The version that was read, so that nobody sends what somebody else changed.'
	});

/** One delivery, line by line. */
export const receiptBody = z
	.strictObject({
		opId: id.meta({
			description: 'Made by the caller once per delivery; sent again it changes nothing.'
		}),
		note: words(1000).default(''),
		lines: z
			.array(
				z
					.strictObject({
						orderLineId: id,
						received: lengths(0).meta({
							description: 'Lengths that arrived, damaged ones included.'
						}),
						damaged: lengths(0).default(0),
						batch: words(60).default(''),
						actualNm: nanometres,
						place: words(60).default('')
					})
					.refine((line) => line.damaged <= line.received, {
						path: ['damaged'],
						message: 'accepted is at most what arrived'
					})
			)
			.min(1, 'accepted is at least one line')
			.max(200, 'accepted are at most 200 lines')
	})
	.meta({ description: 'What arrived; every length in good order becomes metal on hand.' });
export type Receipt = z.output<typeof receiptBody>;

const money = z.int().nullable().meta({ description: 'Whole cents; null without prices.read.' });

export const orderSummary = z.object({
	id: z.string(),
	number: z.int(),
	state: z.enum(['draft', 'sent', 'part received', 'received', 'cancelled']),
	supplierName: z.string(),
	needBy: z.string().nullable(),
	createdAt: z.int(),
	sentAt: z.int().nullable(),
	lengths: z.int(),
	awaited: z.int(),
	totalCents: money
});
export const ordersQuery = z.strictObject({
	state: orderSummary.shape.state.optional(),
	search: words(100).optional()
});
export const sentAnswer = z.object({ outboxId: z.string(), before: z.boolean() });
export const ordersAnswer = z.object({ orders: z.array(orderSummary) });
export const madeAnswer = z.object({
	orders: z.array(z.object({ id: z.string(), number: z.int() }))
});
export const orderAnswer = z
	.object({
		id: z.string(),
		number: z.int(),
		state: orderSummary.shape.state,
		version: z.int(),
		supplier: z.object({ name: z.string(), email: z.string() }),
		needBy: z.string().nullable(),
		deliverTo: z.string(),
		note: z.string(),
		goodsCents: money,
		freightCents: money,
		totalCents: money,
		lines: z.array(
			z.object({
				id: z.string(),
				stockLengthId: z.string(),
				profileCode: z.string(),
				materialCode: z.string(),
				colourCode: z.string(),
				nominalNm: z.int(),
				usableNm: z.int(),
				quantity: z.int(),
				good: z.int(),
				unitPriceCents: money,
				lineCents: money,
				purpose: z.string()
			})
		)
	})
	.meta({ id: 'Order' });
export const receiptAnswer = z.object({
	receiptId: z.string(),
	labels: z.array(z.string()),
	state: orderSummary.shape.state,
	shortBy: z.int(),
	over: z.int()
});
