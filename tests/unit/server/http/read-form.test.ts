import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { readForm } from '../../../../src/lib/server/http/read-form';

const schema = z.strictObject({
	email: z.email('accepted is an e-mail address'),
	new_password: z.string().min(10, 'accepted is 10 characters or more'),
	dueOn: z.iso.date('accepted is a date')
});

function posted(fields: Record<string, string>): Request {
	const body = new FormData();
	for (const [name, value] of Object.entries(fields)) body.set(name, value);
	return new Request('http://bench.test/', { method: 'POST', body });
}

describe('a posted form', () => {
	it('names refused fields in words and keeps what was typed, but no password', async () => {
		const read = await readForm(
			posted({ email: 'nobody', new_password: 'short', dueOn: 'soon' }),
			schema
		);
		expect(read).toMatchObject({
			ok: false,
			problems: [
				{ field: 'email', sentence: 'E-mail: read "nobody"; accepted is an e-mail address.' },
				{
					field: 'new_password',
					sentence: 'New password: read a text kept secret; accepted is 10 characters or more.'
				},
				{ field: 'dueOn', sentence: 'Due on: read "soon"; accepted is a date.' }
			],
			entered: { email: 'nobody', dueOn: 'soon' }
		});
		expect(read.entered).not.toHaveProperty('new_password');
	});
});
