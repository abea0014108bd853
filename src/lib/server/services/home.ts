import type { Context } from '../context';
import {
	countDraftPlans,
	countFailedMail,
	countOpenInvitations,
	countOrders,
	countRunsOnHold,
	countSolvesRunning,
	listOpenJobs
} from '../queries/home';

/** One thing that waits for the person: what, how many, where. */
export interface Waiting {
	readonly kind:
		| 'measure'
		| 'draft-plans'
		| 'planning'
		| 'to-buy'
		| 'draft-orders'
		| 'to-receive'
		| 'failed-mail'
		| 'invitations';
	readonly count: number;
	readonly href: string;
}

/** What waits for whoever is signed in, by what their roles may do; things with nothing waiting are left out. */
export function getHome(context: Context) {
	const { db, shopId, permissions, now } = context;
	const waiting: Waiting[] = [];
	const add = (kind: Waiting['kind'], count: number, href: string) => {
		if (count > 0) waiting.push({ kind, count, href });
	};
	if (permissions.has('site.write')) add('measure', countRunsOnHold(db, shopId), '/site');
	if (permissions.has('plans.release')) add('draft-plans', countDraftPlans(db, shopId), '/jobs');
	if (permissions.has('plans.make')) add('planning', countSolvesRunning(db, shopId), '/jobs');
	if (permissions.has('orders.write'))
		add('draft-orders', countOrders(db, shopId, ['draft']), '/orders');
	if (permissions.has('orders.receive'))
		add('to-receive', countOrders(db, shopId, ['sent', 'part received']), '/orders');
	if (permissions.has('mailbox.read')) add('failed-mail', countFailedMail(db, shopId), '/mailbox');
	if (permissions.has('people.manage'))
		add('invitations', countOpenInvitations(db, shopId, now), '/people');
	return { waiting, jobs: permissions.has('jobs.read') ? listOpenJobs(db, shopId) : [] };
}
