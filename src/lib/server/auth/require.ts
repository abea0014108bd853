import { error } from '@sveltejs/kit';
import type { Context } from '../context';
import type { Permission } from './permissions';

/** The context of a signed-in request; the authorise hook has already checked the route's rule. */
export function requireContext(locals: App.Locals): Context {
	if (!locals.context) error(401, 'Sign in first.');
	return locals.context;
}

/** For what depends on a permission inside a route, e.g. prices on a shared page. */
export const may = (context: Context, permission: Permission): boolean =>
	context.permissions.has(permission);

/** The session of a signed-in request, for what a person does to their own sessions. */
export function requireSession(locals: App.Locals): string {
	if (!locals.sessionId) error(401, 'Sign in first.');
	return locals.sessionId;
}
