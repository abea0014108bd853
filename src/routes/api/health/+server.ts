import { json } from '@sveltejs/kit';
import { isHealthy } from '$lib/server/services/health';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = () => {
	const healthy = isHealthy();
	return json({ status: healthy ? 'ok' : 'failing' }, { status: healthy ? 200 : 503 });
};
