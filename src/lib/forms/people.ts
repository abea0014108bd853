import { z } from 'zod';

const ROLE_WORDS = ['estimator', 'shop lead', 'purchaser', 'installer', 'owner'] as const;
const roles = z
	.array(z.enum(ROLE_WORDS, `accepted is ${ROLE_WORDS.join(', ')}`), 'accepted is one role or more')
	.min(1, 'accepted is one role or more');
const id = z
	.string('accepted is a person of this shop')
	.max(64, 'accepted is a person of this shop');
const email = z
	.string('accepted is an e-mail address')
	.trim()
	.max(254, 'accepted is an e-mail address')
	.pipe(z.email('accepted is an e-mail address such as name@shop.example'));
const password = z
	.string('accepted is a password of 10 to 128 characters')
	.max(1000, 'accepted is a password of 10 to 128 characters');
const name = z
	.string('accepted is a name of up to 100 characters')
	.max(100, 'accepted is a name of up to 100 characters');

export const inviteForm = z.strictObject({ email, roles });
export const withdrawForm = z.strictObject({ id });
/** `seen` is what the page showed, so that two owners do not overwrite each other. */
export const rolesForm = z.strictObject({ id, roles, seen: z.string().max(100) });
export const removeForm = z.strictObject({ id });

export const resetRequestForm = z.strictObject({ email });
export const resetForm = z.strictObject({ password });
/** A person with an account is asked for no name. */
export const acceptForm = z.strictObject({ name: name.optional(), password });

export const nameForm = z.strictObject({ name });
export const passwordForm = z.strictObject({
	current_password: password,
	new_password: password
});
export const sessionForm = z.strictObject({ id });
export const themeForm = z.strictObject({
	theme: z.enum(['system', 'light', 'dark'], 'accepted is system, light or dark')
});
export const shopForm = z.strictObject({ shopId: id });
