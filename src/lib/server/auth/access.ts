import type { Permission } from './permissions';

/** What a route or action asks of whoever calls it. */
export type Rule = 'public' | 'signed in' | Permission;

/**
 * Every route and every form action of the product, and its rule. The authorise hook refuses whatever is not
 * listed, and a test walks the folder of routes and this table against each other.
 * Keys of the inner record: `GET`, `POST ?/name` for a form action (`POST ?/default` when unnamed), or the
 * method of an endpoint.
 */
export const ACCESS: Readonly<Record<string, Readonly<Record<string, Rule>>>> = {
	'/': { GET: 'public' },
	'/api/health': { GET: 'public' },
	'/api/v1/openapi.json': { GET: 'signed in' },

	// people
	'/(auth)/sign-in': { GET: 'public', 'POST ?/default': 'public' },
	'/(auth)/sign-out': { GET: 'public', 'POST ?/default': 'public' },
	'/(auth)/reset-password': { GET: 'public', 'POST ?/default': 'public' },
	'/(auth)/reset-password/[token]': { GET: 'public', 'POST ?/default': 'public' },
	'/(auth)/accept-invite/[token]': { GET: 'public', 'POST ?/default': 'public' },
	'/(app)/people': {
		GET: 'people.manage',
		'POST ?/invite': 'people.manage',
		'POST ?/withdraw': 'people.manage',
		'POST ?/roles': 'people.manage',
		'POST ?/remove': 'people.manage'
	},
	'/(app)/account': {
		GET: 'signed in',
		'POST ?/name': 'signed in',
		'POST ?/password': 'signed in',
		'POST ?/endSession': 'signed in',
		'POST ?/endOthers': 'signed in',
		'POST ?/theme': 'signed in',
		'POST ?/shop': 'signed in'
	},
	'/(app)/settings': { GET: 'settings.read', 'POST ?/default': 'settings.write' },
	'/(app)/history': { GET: 'history.read' },

	// jobs and takeoff
	'/(app)/jobs': { GET: 'jobs.read' },
	'/(app)/jobs/new': { GET: 'jobs.write', 'POST ?/default': 'jobs.write' },
	'/(app)/jobs/[jobId=id]': {
		GET: 'jobs.read',
		'POST ?/edit': 'jobs.write',
		'POST ?/copy': 'jobs.write',
		'POST ?/archive': 'jobs.write',
		'POST ?/unarchive': 'jobs.write',
		'POST ?/delete': 'jobs.write',
		'POST ?/restore': 'jobs.write',
		'POST ?/addElevation': 'jobs.write',
		'POST ?/renameElevation': 'jobs.write',
		'POST ?/moveElevation': 'jobs.write',
		'POST ?/removeElevation': 'jobs.write',
		'POST ?/putUnit': 'jobs.write',
		'POST ?/setCorner': 'jobs.write',
		'POST ?/removeCorner': 'jobs.write'
	},
	'/(app)/jobs/[jobId=id]/takeoff': { GET: 'jobs.read' },
	'/(app)/jobs/[jobId=id]/compare': { GET: 'jobs.read' },
	'/(app)/jobs/[jobId=id]/import': {
		GET: 'jobs.write',
		'POST ?/upload': 'jobs.write',
		'POST ?/map': 'jobs.write',
		'POST ?/setAside': 'jobs.write',
		'POST ?/take': 'jobs.write',
		'POST ?/correct': 'jobs.write',
		'POST ?/undo': 'jobs.write'
	},
	'/api/v1/jobs': { GET: 'jobs.read', POST: 'jobs.write' },
	'/api/v1/jobs/[jobId=id]': { GET: 'jobs.read', PATCH: 'jobs.write' },
	'/api/v1/jobs/[jobId=id]/runs': { GET: 'jobs.read', PATCH: 'jobs.write' },
	'/api/v1/jobs/[jobId=id]/elevations': {
		GET: 'jobs.read',
		POST: 'jobs.write',
		PATCH: 'jobs.write'
	},
	'/api/v1/jobs/[jobId=id]/corners': { GET: 'jobs.read', POST: 'jobs.write' },

	// plans and releases
	'/(app)/jobs/[jobId=id]/plan': {
		GET: 'plans.read',
		'POST ?/start': 'plans.make',
		'POST ?/cancel': 'plans.make'
	},
	'/(app)/jobs/[jobId=id]/plans/[planId=id]': {
		GET: 'plans.read',
		'POST ?/cut': 'plans.release',
		'POST ?/buy': 'plans.release',
		'POST ?/setAside': 'plans.make'
	},
	'/(app)/jobs/[jobId=id]/releases': { GET: 'plans.read' },
	'/(app)/jobs/[jobId=id]/releases/[releaseId=id]': { GET: 'sheets.read' },
	'/(app)/jobs/[jobId=id]/releases/[releaseId=id]/cut-sheet': { GET: 'sheets.read' },
	'/(app)/jobs/[jobId=id]/releases/[releaseId=id]/changes': { GET: 'sheets.read' },
	'/(app)/jobs/[jobId=id]/releases/[releaseId=id]/cut-sheet.xlsx': { GET: 'sheets.read' },
	'/(app)/jobs/[jobId=id]/waste.xlsx': { GET: 'plans.read' },
	'/(app)/jobs/[jobId=id]/waste': { GET: 'plans.read' },
	'/api/v1/solves': { POST: 'plans.make' },
	'/api/v1/solves/[solveId=id]': { GET: 'plans.read' },
	'/api/v1/solves/[solveId=id]/cancel': { POST: 'plans.make' },
	'/api/v1/jobs/[jobId=id]/plans': { GET: 'plans.read' },
	'/api/v1/plans/[planId=id]': { GET: 'plans.read' },
	'/api/v1/what-if': { POST: 'plans.read' },

	// catalog and rack
	'/(app)/profiles': { GET: 'catalog.read' },
	'/(app)/profiles/new': {
		GET: 'catalog.write',
		'POST ?/save': 'catalog.write',
		'POST ?/draw': 'catalog.write'
	},
	'/(app)/profiles/[profileId=id]': {
		GET: 'catalog.read',
		'POST ?/save': 'catalog.write',
		'POST ?/draw': 'catalog.write',
		'POST ?/archive': 'catalog.write',
		'POST ?/restore': 'catalog.write'
	},
	'/(app)/materials': { GET: 'catalog.read' },
	'/(app)/materials/new': { GET: 'catalog.write', 'POST ?/default': 'catalog.write' },
	'/(app)/materials/[materialId=id]': {
		GET: 'catalog.read',
		'POST ?/save': 'catalog.write',
		'POST ?/archive': 'catalog.write',
		'POST ?/restore': 'catalog.write'
	},
	'/(app)/stock': { GET: 'prices.read' },
	'/(app)/stock/new': { GET: 'prices.write', 'POST ?/default': 'prices.write' },
	'/(app)/stock/[stockLengthId=id]': {
		GET: 'prices.read',
		'POST ?/save': 'prices.write',
		'POST ?/archive': 'prices.write',
		'POST ?/restore': 'prices.write'
	},
	'/(app)/suppliers': { GET: 'prices.read' },
	'/(app)/suppliers/new': { GET: 'prices.write', 'POST ?/default': 'prices.write' },
	'/(app)/suppliers/[supplierId=id]': {
		GET: 'prices.read',
		'POST ?/save': 'prices.write',
		'POST ?/archive': 'prices.write',
		'POST ?/restore': 'prices.write'
	},
	'/(app)/rack': { GET: 'rack.read' },
	'/(app)/rack/new': { GET: 'rack.write', 'POST ?/default': 'rack.write' },
	'/(app)/rack/[metalId=id]': {
		GET: 'rack.read',
		'POST ?/correct': 'rack.write',
		'POST ?/scrap': 'rack.write'
	},

	// site
	'/(app)/site': { GET: 'site.read' },
	'/(app)/site/[jobId=id]': { GET: 'site.read' },
	'/(app)/site/[jobId=id]/[elevationId=id]': {
		GET: 'site.read',
		'POST ?/fitted': 'site.write',
		'POST ?/measure': 'site.write',
		'POST ?/holdTo': 'holds.accept'
	},
	'/site-kept': { GET: 'public' },
	'/api/v1/site/[jobId=id]/[elevationId=id]': { GET: 'site.read' },
	'/api/v1/site/acts': { POST: 'site.write' },
	'/(app)/jobs/[jobId=id]/releases/[releaseId=id]/trim-list': { GET: 'sheets.read' },
	'/(app)/jobs/[jobId=id]/measure-sheet': { GET: 'sheets.read' },
	'/(app)/jobs/[jobId=id]/releases/[releaseId=id]/trim-list.xlsx': { GET: 'sheets.read' },

	// buying
	'/(app)/buy': { GET: 'orders.read', 'POST ?/order': 'orders.write' },
	'/(app)/orders': { GET: 'orders.read' },
	'/(app)/orders/[orderId=id]': {
		GET: 'orders.read',
		'POST ?/edit': 'orders.write',
		'POST ?/send': 'orders.write',
		'POST ?/resend': 'orders.write',
		'POST ?/cancel': 'orders.write',
		'POST ?/close': 'orders.write',
		'POST ?/retry': 'orders.write'
	},
	'/(app)/orders/[orderId=id]/order.xlsx': { GET: 'orders.read' },
	'/(app)/orders/[orderId=id]/receive': {
		GET: 'orders.receive',
		'POST ?/default': 'orders.receive'
	},
	'/(app)/mailbox': { GET: 'mailbox.read', 'POST ?/retry': 'mailbox.read' },
	'/(app)/mailbox/[messageId=id]': { GET: 'mailbox.read' },
	'/(app)/mailbox/[messageId=id]/attachments/[attachmentId=id]': { GET: 'mailbox.read' },
	'/api/v1/orders': { GET: 'orders.read', POST: 'orders.write' },
	'/api/v1/orders/[orderId=id]': { GET: 'orders.read' },
	'/api/v1/orders/[orderId=id]/send': { POST: 'orders.write' },
	'/api/v1/orders/[orderId=id]/receipts': { POST: 'orders.receive' },

	// home
	'/(app)/home': { GET: 'signed in' }
};

/** The rule of one request, or null when nothing is listed for it. */
export function ruleFor(routeId: string, method: string, action: string | null): Rule | null {
	const rules = ACCESS[routeId];
	if (!rules) return null;
	if (method === 'HEAD') return rules.GET ?? null;
	const listed = rules[method];
	if (listed) return listed;
	return method === 'POST' ? (rules[`POST ?/${action ?? 'default'}`] ?? null) : null;
}
