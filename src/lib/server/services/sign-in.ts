import { hashPassword, isOutdated, verifyPassword } from '../auth/password';
import { countFailure, forgetFailures, secondsToWait, waitSentence } from '../auth/sign-in-limiter';
import type { Database } from '../db/client';
import { log } from '../log';
import { findUserByEmail, listShopsOf, normaliseEmail, setPasswordHash } from '../queries/people';

export interface Credentials {
	readonly email: string;
	readonly password: string;
	/** Where the request came from, for the limiter. */
	readonly address: string;
	/** The shop to begin with, if the person belongs to it; otherwise their first. */
	readonly shopId?: string;
}

export type SignIn =
	| { readonly ok: true; readonly userId: string; readonly shopId: string }
	| { readonly ok: false; readonly sentence: string };

const WRONG =
	'E-mail and password: this pair was not recognised; accepted is the address and password of a person of a shop.';

const refuse = (sentence: string): SignIn => ({ ok: false, sentence });

/**
 * Checks an address and password. An unknown address, a wrong password, a disabled person and one without a
 * shop are answered alike, in words and in work done.
 */
export async function checkSignIn(db: Database, given: Credentials): Promise<SignIn> {
	const email = normaliseEmail(given.email).slice(0, 254);
	const wait = await secondsToWait(email, given.address);
	if (wait > 0) return refuse(waitSentence(wait));
	const user = findUserByEmail(db, email);
	const right = await verifyPassword(user?.passwordHash ?? null, given.password);
	const shops = user && right && user.disabledAt === null ? listShopsOf(db, user.id) : [];
	const shop = shops.find(({ id }) => id === given.shopId) ?? shops[0];
	if (!user || !shop) {
		await countFailure(email, given.address);
		log.warn({ event: 'sign-in refused', userId: user?.id ?? null }, 'sign-in refused');
		return refuse(WRONG);
	}
	await forgetFailures(email, given.address);
	if (user.passwordHash && isOutdated(user.passwordHash))
		setPasswordHash(db, user.id, await hashPassword(given.password));
	return { ok: true, userId: user.id, shopId: shop.id };
}
