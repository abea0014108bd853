import ExcelJS from 'exceljs';
import { deflateRawSync } from 'node:zlib';
import { crc32 } from './crc32';

/** A workbook of plain cells, made by the library that the product writes with. */
export async function workbook(
	rows: readonly (readonly unknown[])[],
	sheet = 'Takeoff'
): Promise<Buffer> {
	const book = new ExcelJS.Workbook();
	book.addWorksheet(sheet).addRows(rows.map((row) => [...row]));
	return Buffer.from(await book.xlsx.writeBuffer());
}

/** A zip made by hand: what a library would refuse to write can be written here. */
export function zip(parts: Readonly<Record<string, string | Buffer>>): Buffer {
	const locals: Buffer[] = [];
	const central: Buffer[] = [];
	let offset = 0;
	for (const [name, content] of Object.entries(parts)) {
		const plain = Buffer.from(content);
		const packed = deflateRawSync(plain);
		const header = headerOf(name, plain, packed);
		locals.push(Buffer.concat([sign(0x04034b50), header, Buffer.from(name), packed]));
		central.push(centralOf(name, header, offset));
		offset += 30 + Buffer.byteLength(name) + packed.length;
	}
	const directory = Buffer.concat(central);
	return Buffer.concat([...locals, directory, endOf(central.length, directory.length, offset)]);
}

const sign = (of: number) => {
	const bytes = Buffer.alloc(4);
	bytes.writeUInt32LE(of);
	return bytes;
};

function headerOf(name: string, plain: Buffer, packed: Buffer): Buffer {
	const bytes = Buffer.alloc(26);
	bytes.writeUInt16LE(20, 0);
	bytes.writeUInt16LE(8, 4);
	bytes.writeUInt32LE(crc32(plain), 10);
	bytes.writeUInt32LE(packed.length, 14);
	bytes.writeUInt32LE(plain.length, 18);
	bytes.writeUInt16LE(Buffer.byteLength(name), 22);
	return bytes;
}

function centralOf(name: string, header: Buffer, offset: number): Buffer {
	const tail = Buffer.alloc(14);
	tail.writeUInt32LE(offset, 10);
	return Buffer.concat([sign(0x02014b50), Buffer.from([20, 0]), header, tail, Buffer.from(name)]);
}

function endOf(entries: number, size: number, offset: number): Buffer {
	const bytes = Buffer.alloc(22);
	bytes.writeUInt32LE(0x06054b50, 0);
	bytes.writeUInt16LE(entries, 8);
	bytes.writeUInt16LE(entries, 10);
	bytes.writeUInt32LE(size, 12);
	bytes.writeUInt32LE(offset, 16);
	return bytes;
}

const TYPES = `<?xml version="1.0"?><Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types"><Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Default Extension="xml" ContentType="application/xml"/><Override PartName="/xl/workbook.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml"/><Override PartName="/xl/worksheets/sheet1.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml"/></Types>`;
const RELS = `<?xml version="1.0"?><Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship Id="rId1" Type="http://schemas.openxmlformats.org/officeDocument/2006/relationships/officeDocument" Target="xl/workbook.xml"/></Relationships>`;
const BOOK_RELS = `<?xml version="1.0"?><Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship Id="rId1" Type="http://schemas.openxmlformats.org/officeDocument/2006/relationships/worksheet" Target="worksheets/sheet1.xml"/></Relationships>`;
const MAIN = 'xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"';

/** A workbook whose sheet part, and whatever stands before its root, is given word for word. */
export const rawWorkbook = (sheet: string, prologue = '', names = ''): Buffer =>
	zip({
		'[Content_Types].xml': TYPES,
		'_rels/.rels': RELS,
		'xl/workbook.xml': `<?xml version="1.0"?><workbook ${MAIN} xmlns:r="http://schemas.openxmlformats.org/officeDocument/2006/relationships"><sheets><sheet name="Takeoff" sheetId="1" r:id="rId1"/></sheets>${names}</workbook>`,
		'xl/_rels/workbook.xml.rels': BOOK_RELS,
		'xl/worksheets/sheet1.xml': `<?xml version="1.0"?>${prologue}<worksheet ${MAIN}>${sheet}</worksheet>`
	});

const inline = (at: string, text: string) =>
	`<c r="${at}" t="inlineStr"><is><t>${text}</t></is></c>`;
export const TWO_ROWS = `<sheetData><row r="1">${inline('A1', 'Mark')}${inline('B1', 'Length')}</row><row r="2">${inline('A2', 'N01')}${inline('B2', '10 ft')}</row></sheetData>`;
