import type { RequestEvent } from '@sveltejs/kit';
import { getDatabase, type Database } from '../db/client';

/** Who asks, when nobody need be signed in. */
export interface Visit {
	readonly db: Database;
	readonly now: number;
	readonly requestId: string;
	/** Network address, for the limiter. */
	readonly address: string;
}

export const visitOf = (event: RequestEvent): Visit => ({
	db: getDatabase(),
	now: Date.now(),
	requestId: event.locals.requestId,
	address: event.getClientAddress()
});
