import type { Role } from '../db/schema/people';

/** The one permission table: every route and action names a permission (access.ts), every permission its roles. */
export const PERMISSIONS = {
	'jobs.read': ['estimator', 'shop lead', 'purchaser', 'owner'],
	'jobs.write': ['estimator', 'shop lead'],
	'prices.read': ['estimator', 'shop lead', 'purchaser', 'owner'],
	'prices.write': ['purchaser', 'estimator'],
	'catalog.read': ['estimator', 'shop lead', 'purchaser', 'owner'],
	'catalog.write': ['shop lead', 'estimator'],
	'plans.read': ['estimator', 'shop lead', 'purchaser', 'owner'],
	'plans.make': ['estimator', 'shop lead'],
	'plans.release': ['shop lead'],
	'sheets.read': ['estimator', 'shop lead', 'purchaser', 'installer', 'owner'],
	'rack.read': ['shop lead', 'purchaser', 'estimator', 'owner'],
	'rack.write': ['shop lead', 'purchaser'],
	'orders.read': ['purchaser', 'shop lead', 'owner'],
	'orders.write': ['purchaser'],
	'orders.receive': ['purchaser', 'shop lead'],
	'site.read': ['installer', 'shop lead', 'estimator', 'owner'],
	'site.write': ['installer', 'shop lead'],
	'holds.accept': ['shop lead'],
	'people.manage': ['owner'],
	'settings.read': ['owner', 'shop lead'],
	'settings.write': ['owner', 'shop lead'],
	'history.read': ['owner', 'shop lead'],
	'mailbox.read': ['purchaser', 'owner']
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof PERMISSIONS;

/** Every permission that at least one of the roles carries. */
export function permissionsOf(roles: readonly Role[]): ReadonlySet<Permission> {
	const held = new Set<Permission>();
	for (const [permission, allowed] of Object.entries(PERMISSIONS)) {
		if (roles.some((role) => (allowed as readonly Role[]).includes(role)))
			held.add(permission as Permission);
	}
	return held;
}
