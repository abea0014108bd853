import { requireContext } from '$lib/server/auth/require';
import { notFound } from '$lib/server/http/problem';
import { readMessage } from '$lib/server/services/mailbox';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals, params }) =>
	readMessage(requireContext(locals), params.messageId) ?? notFound('message');
