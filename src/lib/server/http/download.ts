/** A file answer that no browser renders: attachment, nosniff, sandboxed; the name per RFC 6266. */
export function download(content: Uint8Array | string, filename: string, type: string): Response {
	const plain = filename.replace(/[^\w.-]+/g, '-');
	const body = typeof content === 'string' ? content : new Uint8Array(content);
	return new Response(body, {
		headers: {
			'content-type': type,
			'content-disposition': `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(filename)}`,
			'x-content-type-options': 'nosniff',
			'content-security-policy': "sandbox; default-src 'none'",
			'cache-control': 'private, no-store'
		}
	});
}

export const XLSX = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';
