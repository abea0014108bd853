import { FileRefused } from './limits';

const REFUSED = 'The file holds no text that can be read; accepted are .xlsx, .csv and .tsv files.';

/** Text of a csv file: by its byte order mark, as UTF-16 when every other byte is zero, as UTF-8, else Windows-1252. */
export function decodeText(bytes: Uint8Array): string {
	const marked = byMark(bytes);
	const text = marked ?? byContent(bytes);
	// eslint-disable-next-line no-control-regex -- control characters are what tells a program from a text
	if (/[\u0000-\u0008\u000e-\u001a\u001c-\u001f]/.test(text)) throw new FileRefused(REFUSED);
	return text.replace(/^\ufeff/, '');
}

function byMark(bytes: Uint8Array): string | null {
	if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
	if (bytes[0] === 0xfe && bytes[1] === 0xff) return new TextDecoder('utf-16be').decode(bytes);
	if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf)
		return new TextDecoder('utf-8').decode(bytes);
	return null;
}

function byContent(bytes: Uint8Array): string {
	const sample = bytes.subarray(0, 400);
	const zeros = (odd: 0 | 1) => sample.filter((byte, at) => byte === 0 && at % 2 === odd).length;
	if (zeros(1) > sample.length / 4) return new TextDecoder('utf-16le').decode(bytes);
	if (zeros(0) > sample.length / 4) return new TextDecoder('utf-16be').decode(bytes);
	try {
		return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
	} catch (cause) {
		if (!(cause instanceof TypeError)) throw cause;
		return new TextDecoder('windows-1252').decode(bytes);
	}
}
