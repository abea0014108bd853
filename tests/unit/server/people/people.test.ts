import { beforeEach, describe, expect, it } from 'vitest';
import { findLiveSession, startSession } from '../../../../src/lib/server/auth/session';
import { hashToken } from '../../../../src/lib/server/auth/tokens';
import type { Database } from '../../../../src/lib/server/db/client';
import { testDatabase } from '../../../../src/lib/server/db/testing';
import { rolesIn } from '../../../../src/lib/server/queries/people';
import {
	acceptInvitation,
	readInvitation
} from '../../../../src/lib/server/services/accept-invite';
import { changeName, changePassword } from '../../../../src/lib/server/services/account';
import { changeRoles, removePerson } from '../../../../src/lib/server/services/change-roles';
import {
	INVITATION_MS,
	invitePerson,
	withdrawInvitation
} from '../../../../src/lib/server/services/invite-person';
import {
	RESET_MS,
	isResetOpen,
	requestPasswordReset,
	resetPassword
} from '../../../../src/lib/server/services/reset-password';
import { checkSignIn } from '../../../../src/lib/server/services/sign-in';
import {
	NOON,
	PASSWORD,
	addPerson,
	addShop,
	contextFor,
	rows,
	visit
} from '../../../support/people';

const NEXT = 'a longer bench phrase';
let db: Database;
let shop: string;
let owner: string;
let user: string;
let visitor = 0;

beforeEach(async () => {
	db = await testDatabase();
	shop = addShop(db, 'Plover Sheet Works');
	owner = await addPerson(db, shop, 'owner@plover.example', ['owner']);
	user = await addPerson(db, shop, `est${(visitor += 1)}@plover.example`, ['estimator']);
});

const email = () => `est${visitor}@plover.example`;
const signIn = (password: string, address = email()) =>
	checkSignIn(db, { email: address, password, address: `203.0.113.${visitor}` });
const mails = () => rows(db, 'select * from outbox order by rowid');
const tokenIn = (mail: Record<string, unknown> | undefined) =>
	/\/(?:accept-invite|reset-password)\/(\S+)/.exec(String(mail?.text))![1]!;
const history = () => rows(db, 'select action, summary, shop_id, user_id from history order by id');

describe('an invitation', () => {
	const invite = (to = 'new@plover.example') =>
		invitePerson(contextFor(db, shop, owner), { email: to, roles: ['purchaser', 'installer'] });

	it('goes out by e-mail with a link of 256 random bits, of which the hash is kept', () => {
		expect(invite(' New@Plover.example ').ok).toBe(true);
		const [mail] = mails();
		expect(mail).toMatchObject({ to: 'new@plover.example', kind: 'invitation', shop_id: shop });
		const token = tokenIn(mail);
		expect(Buffer.from(token, 'base64url')).toHaveLength(32);
		const kept = rows(db, 'select * from invitations');
		expect(kept[0]!.token_hash).toBe(hashToken(token));
		expect(JSON.stringify([kept, history()])).not.toContain(token);
		expect(history()[0]).toMatchObject({ action: 'invited', shop_id: shop, user_id: owner });
	});

	it('makes a person with the roles, once', async () => {
		invite();
		const token = tokenIn(mails()[0]);
		expect(readInvitation(token, NOON, db)).toMatchObject({
			known: false,
			roles: ['purchaser', 'installer']
		});
		const accept = () => acceptInvitation({ token, name: 'Noor', password: NEXT }, visit(db, NOON));
		expect(await accept()).toEqual({
			ok: true,
			value: { email: 'new@plover.example', shopId: shop }
		});
		const signedIn = await signIn(NEXT, 'new@plover.example');
		expect(signedIn).toMatchObject({ ok: true, shopId: shop });
		if (signedIn.ok)
			expect(rolesIn(db, shop, signedIn.userId).sort()).toEqual(['installer', 'purchaser']);
		expect(history().at(-1)).toMatchObject({ action: 'joined' });
		expect(await accept()).toMatchObject({ ok: false, problem: { field: 'token' } });
	});

	it('is won by one of two who accept at the same moment', async () => {
		invite();
		const token = tokenIn(mails()[0]);
		const both = await Promise.all(
			['Noor', 'Omar'].map((name) =>
				acceptInvitation({ token, name, password: NEXT }, visit(db, NOON))
			)
		);
		expect(both.filter((outcome) => outcome.ok)).toHaveLength(1);
		expect(rows(db, `select name from users where email = 'new@plover.example'`)).toHaveLength(1);
	});

	it('asks for a name and a good password, and keeps the link for another try', async () => {
		invite();
		const token = tokenIn(mails()[0]);
		expect(await acceptInvitation({ token, name: ' ', password: NEXT }, visit(db))).toMatchObject({
			problem: { field: 'name' }
		});
		expect(
			await acceptInvitation({ token, name: 'Noor', password: 'short' }, visit(db))
		).toMatchObject({ problem: { field: 'password' } });
		expect(readInvitation(token, NOON, db)).not.toBeNull();
	});

	it('lets somebody with an account join with its password only', async () => {
		const other = addShop(db, 'Zephyr Metal');
		const otherOwner = await addPerson(db, other, 'owner@zephyr.example', ['owner']);
		invitePerson(contextFor(db, other, otherOwner), { email: email(), roles: ['installer'] });
		const token = tokenIn(mails()[0]);
		expect(readInvitation(token, NOON, db)).toMatchObject({
			known: true,
			shopName: 'Zephyr Metal'
		});
		const wrong = await acceptInvitation({ token, name: '', password: NEXT }, visit(db));
		expect(wrong).toMatchObject({ problem: { field: 'password' } });
		const right = await acceptInvitation({ token, name: '', password: PASSWORD }, visit(db));
		expect(right).toMatchObject({ ok: true, value: { shopId: other } });
		expect(rolesIn(db, other, user)).toEqual(['installer']);
		expect(rolesIn(db, shop, user)).toEqual(['estimator']);
		expect(await signIn(PASSWORD)).toMatchObject({ ok: true });
	});

	it('works for seven days and not when withdrawn or replaced', () => {
		const first = invite();
		const token = tokenIn(mails()[0]);
		expect(readInvitation(token, NOON + INVITATION_MS - 1, db)).not.toBeNull();
		expect(readInvitation(token, NOON + INVITATION_MS, db)).toBeNull();
		invite();
		expect(readInvitation(token, NOON, db)).toBeNull();
		const second = tokenIn(mails()[1]);
		const id = rows(db, 'select id from invitations where withdrawn_at is null')[0]!.id as string;
		expect(first.ok && first.value.id).not.toBe(id);
		expect(withdrawInvitation(contextFor(db, shop, owner), id)).toBe(true);
		expect(withdrawInvitation(contextFor(db, shop, owner), id)).toBe(false);
		expect(readInvitation(second, NOON, db)).toBeNull();
	});

	it('of another shop cannot be withdrawn', async () => {
		const outcome = invite();
		const other = addShop(db, 'Zephyr Metal');
		const otherOwner = await addPerson(db, other, 'owner@zephyr.example', ['owner']);
		const id = outcome.ok ? outcome.value.id : '';
		expect(withdrawInvitation(contextFor(db, other, otherOwner), id)).toBe(false);
		expect(readInvitation(tokenIn(mails()[0]), NOON, db)).not.toBeNull();
	});

	it('is refused for somebody who is in the shop', () => {
		expect(invite(email().toUpperCase())).toMatchObject({ ok: false, problem: { field: 'email' } });
		expect(mails()).toHaveLength(0);
	});
});

describe('a password reset', () => {
	const ask = (to = email(), now = NOON) =>
		requestPasswordReset(to, visit(db, now, `203.0.113.${visitor}`));
	const set = (token: string, password = NEXT, now = NOON) =>
		resetPassword({ token, password }, visit(db, now));

	it('sets the password once and ends every session', async () => {
		const sid = startSession(db, { userId: user, shopId: shop, userAgent: '' }, NOON);
		await ask();
		const token = tokenIn(mails()[0]);
		expect(JSON.stringify(rows(db, 'select * from password_resets'))).not.toContain(token);
		expect(await set(token)).toMatchObject({ ok: true });
		expect(findLiveSession(db, sid, NOON)).toBeNull();
		expect(await signIn(PASSWORD)).toMatchObject({ ok: false });
		expect(await signIn(NEXT)).toMatchObject({ ok: true });
		expect(await set(token, 'another long phrase')).toMatchObject({ problem: { field: 'token' } });
		expect(history().at(-1)).toMatchObject({ action: 'changed password', user_id: user });
	});

	it('works for thirty minutes, and only the newest link does', async () => {
		await ask();
		const first = tokenIn(mails()[0]);
		expect(isResetOpen(first, NOON + RESET_MS - 1, db)).toBe(true);
		expect(await set(first, NEXT, NOON + RESET_MS)).toMatchObject({ ok: false });
		await ask();
		expect(isResetOpen(first, NOON, db)).toBe(false);
		expect(isResetOpen(tokenIn(mails()[1]), NOON, db)).toBe(true);
	});

	it('sends nothing to an unknown, disabled or removed person, and never fails', async () => {
		await ask('nobody@plover.example');
		db.$client.prepare('update users set disabled_at = 1 where id = ?').run(user);
		await ask();
		expect(mails()).toHaveLength(0);
	});

	it('keeps the link when the new password is refused', async () => {
		await ask();
		const token = tokenIn(mails()[0]);
		expect(await set(token, 'password123')).toMatchObject({ problem: { field: 'password' } });
		expect(await set(token)).toMatchObject({ ok: true });
	});

	it('does not flood a letter box: three links an hour', async () => {
		for (let i = 0; i < 6; i += 1) await ask();
		expect(mails()).toHaveLength(3);
	});
});

describe('roles', () => {
	const roles = (
		userId: string,
		wanted: Parameters<typeof changeRoles>[1]['roles'],
		seen = rolesIn(db, shop, userId)
	) => changeRoles(contextFor(db, shop, owner), { userId, roles: wanted, seen });

	it('are replaced and told in the history', () => {
		expect(roles(user, ['shop lead', 'estimator'])).toEqual({ kind: 'done' });
		expect(rolesIn(db, shop, user).sort()).toEqual(['estimator', 'shop lead']);
		expect(history().at(-1)!.summary).toContain('from estimator to estimator, shop lead');
	});

	it('never leave the shop without an owner', () => {
		expect(roles(owner, ['estimator'])).toEqual({ kind: 'last owner' });
		expect(removePerson(contextFor(db, shop, owner), owner)).toEqual({ kind: 'last owner' });
		expect(rolesIn(db, shop, owner)).toEqual(['owner']);
		roles(user, ['owner']);
		expect(roles(owner, ['estimator'])).toEqual({ kind: 'done' });
	});

	it('changed meanwhile by somebody else are shown, not overwritten', () => {
		roles(user, ['installer']);
		expect(roles(user, ['purchaser'], ['estimator'])).toEqual({
			kind: 'conflict',
			theirs: ['installer']
		});
		expect(rolesIn(db, shop, user)).toEqual(['installer']);
	});

	it('of somebody of another shop are out of reach', async () => {
		const other = addShop(db, 'Zephyr Metal');
		const stranger = await addPerson(db, other, 'owner@zephyr.example', ['owner']);
		expect(roles(stranger, ['installer'], ['owner'])).toEqual({ kind: 'missing' });
		expect(removePerson(contextFor(db, shop, owner), stranger)).toEqual({ kind: 'missing' });
		expect(rolesIn(db, other, stranger)).toEqual(['owner']);
	});
});

describe('one’s own account', () => {
	const change = (current: string, next: string, sessionId = '') =>
		changePassword(contextFor(db, shop, user), {
			current,
			next,
			sessionId,
			address: `203.0.113.${visitor}`
		});

	it('takes a new password for the present one, and ends the other sessions', async () => {
		const begin = () => startSession(db, { userId: user, shopId: shop, userAgent: '' }, NOON);
		const [mine, other] = [begin(), begin()];
		expect(await change('not the right one', NEXT, hashToken(mine))).toMatchObject({
			problem: { field: 'current_password' }
		});
		expect(await change(PASSWORD, 'short', hashToken(mine))).toMatchObject({
			problem: { field: 'new_password' }
		});
		expect(findLiveSession(db, other, NOON)).not.toBeNull();
		expect(await change(PASSWORD, NEXT, hashToken(mine))).toMatchObject({ ok: true });
		expect(findLiveSession(db, other, NOON)).toBeNull();
		expect(findLiveSession(db, mine, NOON)).not.toBeNull();
		expect(await signIn(NEXT)).toMatchObject({ ok: true });
	});

	it('limits guesses of the present password', async () => {
		for (let i = 0; i < 5; i += 1) await change('not the right one', NEXT);
		const answer = await change(PASSWORD, NEXT);
		expect(answer).toMatchObject({
			problem: { sentence: expect.stringMatching(/^Too many tries/) }
		});
	});

	it('takes a name, not an empty one', () => {
		expect(changeName(contextFor(db, shop, user), '  ')).toMatchObject({ ok: false });
		expect(changeName(contextFor(db, shop, user), ' Mara Quill ')).toMatchObject({ ok: true });
		expect(rows(db, 'select name from users where id = ?', user)[0]!.name).toBe('Mara Quill');
	});
});
