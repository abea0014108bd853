import QRCode from 'qrcode';

/** A QR symbol as one path of squares, one unit to a module, quiet zone of four modules included. */
export interface QrSymbol {
	readonly path: string;
	readonly size: number;
}
const QUIET = 4;

/** Returns the symbol of a text at level Q: still read when a quarter of it is dirty. */
export function qrSymbol(text: string): QrSymbol {
	const { modules } = QRCode.create(text, { errorCorrectionLevel: 'Q' });
	let path = '';
	for (let row = 0; row < modules.size; row++)
		for (let column = 0; column < modules.size; column++)
			if (modules.get(row, column)) path += `M${column + QUIET} ${row + QUIET}h1v1h-1z`;
	return { path, size: modules.size + 2 * QUIET };
}
