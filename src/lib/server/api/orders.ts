import {
	madeAnswer,
	newOrdersBody,
	orderAnswer,
	ordersAnswer,
	ordersQuery,
	receiptAnswer,
	receiptBody,
	sendOrderBody,
	sentAnswer
} from '../../forms/order';
import type { ApiOperation } from './operation';

const conflict = {
	description: 'Somebody else saved first: `yours` and `theirs` hold both versions.'
} as const;

/** Stock orders: made from what is to buy, sent to suppliers, received. */
export const API: readonly ApiOperation[] = [
	{
		method: 'get',
		path: '/api/v1/orders',
		summary: 'Orders of the shop, newest first',
		query: ordersQuery,
		responses: { 200: { description: 'Orders.', schema: ordersAnswer } },
		permission: 'orders.read'
	},
	{
		method: 'post',
		path: '/api/v1/orders',
		summary: 'Makes one draft order per supplier',
		body: newOrdersBody,
		responses: { 201: { description: 'The drafts that were made.', schema: madeAnswer } },
		permission: 'orders.write'
	},
	{
		method: 'get',
		path: '/api/v1/orders/{orderId}',
		summary: 'One order with its lines',
		parameters: ['orderId'],
		responses: { 200: { description: 'The order.', schema: orderAnswer } },
		permission: 'orders.read'
	},
	{
		method: 'post',
		path: '/api/v1/orders/{orderId}/send',
		summary: 'Sends a draft to its supplier by e-mail, once',
		parameters: ['orderId'],
		body: sendOrderBody,
		responses: {
			200: { description: 'In line to be sent; `before` when it already was.', schema: sentAnswer },
			409: conflict
		},
		permission: 'orders.write'
	},
	{
		method: 'post',
		path: '/api/v1/orders/{orderId}/receipts',
		summary: 'Records one delivery; the same `opId` is recorded once',
		parameters: ['orderId'],
		body: receiptBody,
		responses: { 201: { description: 'What is now on hand.', schema: receiptAnswer } },
		permission: 'orders.receive'
	}
];
