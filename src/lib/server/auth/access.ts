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
