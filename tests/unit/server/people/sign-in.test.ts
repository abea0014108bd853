import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { hash } from '@node-rs/argon2';
import type { Database } from '../../../../src/lib/server/db/client';
import { testDatabase } from '../../../../src/lib/server/db/testing';
import { checkSignIn } from '../../../../src/lib/server/services/sign-in';
import { PASSWORD, addPerson, addRole, addShop, rows } from '../../../support/people';

let db: Database;
let shop: string;
let user: string;
let visitor = 0;
/** The limiter remembers across tests, so every test comes from an address of its own. */
let address: string;
const tryIn = (email: string, password: string, from = address, shopId?: string) =>
	checkSignIn(db, { email, password, address: from, shopId });

beforeEach(async () => {
	db = await testDatabase();
	shop = addShop(db, 'Plover Sheet Works');
	user = await addPerson(db, shop, 'est@plover.example', ['estimator']);
	address = `198.51.100.${(visitor += 1)}`;
});
afterEach(() => vi.useRealTimers());

describe('sign-in', () => {
	it('takes the right password, whatever the case of the address', async () => {
		expect(await tryIn(' Est@Plover.example ', PASSWORD)).toEqual({
			ok: true,
			userId: user,
			shopId: shop
		});
	});

	it('answers an unknown address, a wrong password, a disabled person and one of no shop alike', async () => {
		await addPerson(db, shop, 'gone@plover.example', ['installer']);
		db.$client.prepare(`update users set disabled_at = 1 where email like 'gone%'`).run();
		await addPerson(db, shop, 'nowhere@plover.example', []);
		const answers = [
			await tryIn('est@plover.example', 'wrong password here'),
			await tryIn('nobody@plover.example', PASSWORD),
			await tryIn('gone@plover.example', PASSWORD),
			await tryIn('nowhere@plover.example', PASSWORD)
		];
		expect(answers[0]).toMatchObject({ ok: false });
		for (const answer of answers) expect(answer).toEqual(answers[0]);
	});

	it('does the same work for an unknown address as for a wrong password', async () => {
		const middle = async (email: string) => {
			const times: number[] = [];
			for (let i = 0; i < 7; i += 1) {
				const started = performance.now();
				await tryIn(email, 'wrong password here', `${address}.${email}.${i}`);
				times.push(performance.now() - started);
			}
			return times.sort((a, b) => a - b)[3]!;
		};
		const known = await middle('est@plover.example');
		const unknown = await middle('nobody@plover.example');
		// The hash takes tens of milliseconds; without the dummy the unknown one would take under one.
		expect(unknown / known).toBeGreaterThan(0.4);
		expect(unknown / known).toBeLessThan(2.5);
	});

	it('begins in the shop asked for when the person belongs to it, else in their first', async () => {
		const second = addShop(db, 'Zephyr Metal');
		addRole(db, second, user, 'installer');
		const foreign = addShop(db, 'Avocet Roofing');
		expect(await tryIn('est@plover.example', PASSWORD, address, second)).toMatchObject({
			shopId: second
		});
		expect(await tryIn('est@plover.example', PASSWORD, address, foreign)).toMatchObject({
			shopId: shop
		});
	});

	it('replaces a hash of weaker parameters', async () => {
		const weak = await hash(PASSWORD, { memoryCost: 8192, timeCost: 2, parallelism: 1 });
		db.$client.prepare('update users set password_hash = ?').run(weak);
		expect(await tryIn('est@plover.example', PASSWORD)).toMatchObject({ ok: true });
		expect(rows(db, 'select password_hash from users')[0]!.password_hash).toMatch(/m=19456,t=2/);
	});
});

describe('the sign-in limiter', () => {
	const fail = async (times: number, email = 'est@plover.example') => {
		let answer;
		for (let i = 0; i < times; i += 1) answer = await tryIn(email, 'wrong password here');
		return answer;
	};

	it('makes the sixth try wait and says how long, for the right password too', async () => {
		await fail(5);
		const answer = await tryIn('est@plover.example', PASSWORD);
		expect(answer).toMatchObject({ ok: false });
		if (!answer.ok)
			expect(answer.sentence).toMatch(
				/^Too many tries; the next one is accepted in 1[45] seconds\.$/
			);
	});

	it('waits twice as long after each further failure, and lets the right one in afterwards', async () => {
		vi.useFakeTimers({ toFake: ['Date'] });
		await fail(5);
		vi.setSystemTime(Date.now() + 15_001);
		await fail(1);
		vi.setSystemTime(Date.now() + 15_001);
		const early = await tryIn('est@plover.example', PASSWORD);
		expect(early).toMatchObject({ ok: false });
		vi.setSystemTime(Date.now() + 15_001);
		expect(await tryIn('est@plover.example', PASSWORD)).toMatchObject({ ok: true });
	});

	it('slows unknown addresses just the same, so that it tells nothing', async () => {
		await fail(5, 'nobody@plover.example');
		expect(await fail(1, 'nobody@plover.example')).toMatchObject({
			sentence: expect.stringMatching(/^Too many tries/)
		});
	});

	it('does not lock the person out from elsewhere', async () => {
		await fail(5);
		expect(await tryIn('est@plover.example', PASSWORD, '203.0.113.9')).toMatchObject({ ok: true });
	});

	it('forgets mistypes after a right password', async () => {
		await fail(4);
		expect(await tryIn('est@plover.example', PASSWORD)).toMatchObject({ ok: true });
		await fail(4);
		expect(await tryIn('est@plover.example', PASSWORD)).toMatchObject({ ok: true });
	});
});
