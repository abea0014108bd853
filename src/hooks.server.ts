import { building } from '$app/environment';
import { tasks } from '$lib/server/tasks';
import { startBackground, stopBackground } from '$lib/server/background';
import { authorise } from '$lib/server/hooks/authorise';
import { requestId } from '$lib/server/hooks/request-id';
import { sameOrigin } from '$lib/server/hooks/same-origin';
import { securityHeaders } from '$lib/server/hooks/security-headers';
import { session } from '$lib/server/hooks/session';
import { reportError } from '$lib/server/hooks/report-error';
import type { HandleServerError, ServerInit } from '@sveltejs/kit';
import { sequence } from '@sveltejs/kit/hooks';

export const init: ServerInit = async () => {
	if (building) return;
	await startBackground(tasks());
	process.once('sveltekit:shutdown', () => void stopBackground());
};

export const handle = sequence(requestId, securityHeaders, sameOrigin, session, authorise);

export const handleError: HandleServerError = reportError;
