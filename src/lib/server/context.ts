import type { Database } from './db/client';
import type { Permission } from './auth/permissions';
import type { Role } from './db/schema/people';

/** Who acts, for which shop, when: the first argument of every service. The shop comes from the session only. */
export interface Context {
	readonly db: Database;
	readonly shopId: string;
	readonly shopName: string;
	readonly userId: string;
	readonly userName: string;
	readonly roles: readonly Role[];
	readonly permissions: ReadonlySet<Permission>;
	readonly requestId: string;
	/** UTC milliseconds of the request. */
	readonly now: number;
}
