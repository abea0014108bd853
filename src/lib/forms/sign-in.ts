import { z } from 'zod';

export const signInForm = z.strictObject({
	email: z.string('accepted is an e-mail address').max(254, 'accepted is an e-mail address'),
	password: z.string('accepted is your password').max(1000, 'accepted is your password'),
	next: z.string().max(2000, 'accepted is a path of this site').optional()
});
