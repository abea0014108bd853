import { hash } from '@node-rs/argon2';
import { describe, expect, it, test } from 'vitest';
import {
	checkPassword,
	hashPassword,
	isOutdated,
	verifyPassword
} from '../../../../src/lib/server/auth/password';

const EMAIL = 'mara.quill@plover.example';

describe('passwords', () => {
	it('are kept as argon2id with 19 MiB, two passes, one lane', async () => {
		const stored = await hashPassword('a quiet brake at noon');
		expect(stored).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
		expect(await verifyPassword(stored, 'a quiet brake at noon')).toBe(true);
		expect(await verifyPassword(stored, 'a quiet brake at noon ')).toBe(false);
		expect(isOutdated(stored)).toBe(false);
	});

	it('are never right for somebody without one', async () => {
		expect(await verifyPassword(null, '')).toBe(false);
		expect(await verifyPassword(null, 'a quiet brake at noon')).toBe(false);
	});

	it('made with weaker parameters are outdated', async () => {
		expect(isOutdated(await hash('x', { memoryCost: 8192, timeCost: 2, parallelism: 1 }))).toBe(
			true
		);
	});

	it('are not cut off: the 128th character counts', async () => {
		const long = 'é'.repeat(64) + 'q'.repeat(63);
		const stored = await hashPassword(`${long}a`);
		expect(await verifyPassword(stored, `${long}b`)).toBe(false);
	});
});

test.each([
	['bench-and-brake-test'],
	['  leading and trailing spaces  '],
	['ñandú über 東京 🪶🪶'],
	['q'.repeat(60) + 'wxyz'.repeat(17)],
	['1/8" kerf, 14\'-7 3/16"']
])('accepted: %s', (password) => {
	expect(checkPassword(password, EMAIL)).toEqual({ ok: true, value: password });
});

test.each([
	['', 'nothing was entered'],
	['short-one', '9 characters'],
	['🪶'.repeat(9), '9 characters'],
	['wxyz'.repeat(33), '132 characters'],
	['password123', 'easily guessed'],
	['Password123!', 'easily guessed'],
	['QWERTYUIOP', 'easily guessed'],
	['1234567890', 'easily guessed'],
	['9876543210', 'easily guessed'],
	['abcdefghijkl', 'easily guessed'],
	['aaaaaaaaaaaa', 'easily guessed'],
	['abababababab', 'easily guessed'],
	['sunshine2026', 'easily guessed'],
	['mara.quill', 'easily guessed'],
	[EMAIL, 'easily guessed'],
	['lapwing2026!', 'easily guessed']
])('refused: %s', (password, reason) => {
	const checked = checkPassword(password, EMAIL);
	expect(checked.ok).toBe(false);
	if (checked.ok) return;
	expect(`${checked.problem.received || 'nothing was entered'}`).toContain(reason);
	if (password) expect(JSON.stringify(checked.problem)).not.toContain(password);
});
