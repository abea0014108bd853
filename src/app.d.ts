import type { Context } from '$lib/server/context';

declare global {
	namespace App {
		interface Locals {
			/** Set when the request carries a live session; null otherwise. */
			context: Context | null;
			/** Raw session id hash, for signing out and listing sessions; null when signed out. */
			sessionId: string | null;
			requestId: string;
			theme: 'system' | 'light' | 'dark';
		}
		interface Error {
			message: string;
			requestId?: string;
		}
	}
}

export {};
