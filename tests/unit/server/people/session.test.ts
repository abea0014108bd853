import { beforeEach, describe, expect, it } from 'vitest';
import {
	ABSOLUTE_MS,
	IDLE_MS,
	findLiveSession,
	startSession
} from '../../../../src/lib/server/auth/session';
import { hashToken } from '../../../../src/lib/server/auth/tokens';
import type { Database } from '../../../../src/lib/server/db/client';
import { testDatabase } from '../../../../src/lib/server/db/testing';
import { revokeSession } from '../../../../src/lib/server/queries/sessions';
import {
	endOtherSessions,
	endSession,
	readAccount,
	switchShop
} from '../../../../src/lib/server/services/account';
import { changeRoles, removePerson } from '../../../../src/lib/server/services/change-roles';
import { NOON, addPerson, addRole, addShop, contextFor, rows } from '../../../support/people';

let db: Database;
let shop: string;
let owner: string;
let user: string;
const begin = (userId = user, now = NOON) =>
	startSession(db, { userId, shopId: shop, userAgent: 'Firefox/128.0 (Windows)' }, now);
const live = (sid: string, now = NOON) => findLiveSession(db, sid, now);
/** Someone at work: a request every hour. */
const keepBusy = (sid: string, until: number) => {
	for (let at = NOON; at < until; at += 3_600_000) live(sid, at);
};

beforeEach(async () => {
	db = await testDatabase();
	shop = addShop(db, 'Plover Sheet Works');
	owner = await addPerson(db, shop, 'owner@plover.example', ['owner']);
	user = await addPerson(db, shop, 'est@plover.example', ['estimator']);
});

describe('a session', () => {
	it('is known by a random sid of which the database keeps the hash only', () => {
		const sid = begin();
		expect(Buffer.from(sid, 'base64url')).toHaveLength(32);
		expect(begin()).not.toBe(sid);
		expect(JSON.stringify(rows(db, 'select * from sessions'))).not.toContain(sid);
		expect(live(sid)?.person).toMatchObject({ userId: user, shopId: shop, roles: ['estimator'] });
	});

	it('is nobody’s for an unknown sid', () => {
		begin();
		expect(live('x')).toBeNull();
		expect(live(hashToken('x'))).toBeNull();
	});

	it('ends at once when revoked', () => {
		const sid = begin();
		revokeSession(db, hashToken(sid), NOON);
		expect(live(sid, NOON + 1)).toBeNull();
	});

	it('ends when idle for twelve hours, and not before', () => {
		const sid = begin();
		expect(live(sid, NOON + IDLE_MS - 1)).not.toBeNull();
		expect(live(sid, NOON + IDLE_MS - 1 + IDLE_MS)).toBeNull();
	});

	it('ends after thirty days however busy it is', () => {
		const sid = begin();
		keepBusy(sid, NOON + ABSOLUTE_MS);
		expect(live(sid, NOON + ABSOLUTE_MS - 1)).not.toBeNull();
		expect(live(sid, NOON + ABSOLUTE_MS)).toBeNull();
	});

	it('ends when the person is disabled', () => {
		const sid = begin();
		db.$client.prepare('update users set disabled_at = ? where id = ?').run(NOON, user);
		expect(live(sid)).toBeNull();
	});

	it('has the roles of this moment: a change counts from the next request', () => {
		const sid = begin();
		const change = changeRoles(contextFor(db, shop, owner), {
			userId: user,
			roles: ['purchaser', 'installer'],
			seen: ['estimator']
		});
		expect(change).toEqual({ kind: 'done' });
		expect([...live(sid)!.person.roles].sort()).toEqual(['installer', 'purchaser']);
	});

	it('ends at once when the person is removed from the shop', () => {
		const sid = begin();
		expect(removePerson(contextFor(db, shop, owner), user)).toEqual({ kind: 'done' });
		expect(live(sid)).toBeNull();
		addRole(db, shop, user, 'estimator');
		expect(live(sid)).toBeNull();
	});

	it('is not kept alive by membership of another shop', () => {
		const sid = begin();
		const other = addShop(db, 'Zephyr Metal');
		addRole(db, other, user, 'owner');
		removePerson(contextFor(db, shop, owner), user);
		expect(live(sid)).toBeNull();
	});
});

describe('a person’s sessions', () => {
	it('are listed with the device, and one or all others can be ended', () => {
		const [mine, second, third] = [begin(), begin(), begin()];
		const context = contextFor(db, shop, user);
		const listed = readAccount(context, hashToken(mine)).sessions;
		expect(listed).toHaveLength(3);
		expect(listed.filter((session) => session.isThis)).toHaveLength(1);
		expect(listed[0]!.device).toBe('Firefox on Windows');
		expect(endSession(context, hashToken(second))).toBe(true);
		expect(live(second)).toBeNull();
		expect(endOtherSessions(context, hashToken(mine))).toBe(1);
		expect(live(third)).toBeNull();
		expect(live(mine)).not.toBeNull();
	});

	it('of somebody else cannot be ended', () => {
		const theirs = begin(owner);
		expect(endSession(contextFor(db, shop, user), hashToken(theirs))).toBe(false);
		expect(live(theirs)).not.toBeNull();
	});

	it('turn to another shop only when the person belongs to it', () => {
		const sid = begin();
		const other = addShop(db, 'Zephyr Metal');
		const context = contextFor(db, shop, user);
		expect(switchShop(context, hashToken(sid), other)).toBe(false);
		addRole(db, other, user, 'purchaser');
		expect(switchShop(context, hashToken(sid), other)).toBe(true);
		expect(live(sid)?.person).toMatchObject({ shopId: other, roles: ['purchaser'] });
	});
});
