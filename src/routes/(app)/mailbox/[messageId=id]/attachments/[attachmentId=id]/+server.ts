import { requireContext } from '$lib/server/auth/require';
import { download } from '$lib/server/http/download';
import { notFound } from '$lib/server/http/problem';
import { readAttachment } from '$lib/server/services/mailbox';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals, params }) => {
	const { messageId, attachmentId } = params;
	const found = readAttachment(requireContext(locals), messageId, attachmentId);
	if (!found) notFound('attachment');
	return download(found.content, found.filename, found.contentType);
};
