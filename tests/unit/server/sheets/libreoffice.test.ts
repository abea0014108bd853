import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { cutSheetWorkbook } from '../../../../src/lib/server/sheets/cut-sheet';
import { trimListWorkbook } from '../../../../src/lib/server/sheets/trim-list';
import { sampleSnapshot } from '../../../support/snapshot';

const installed = spawnSync('soffice', ['--version']).status === 0;

/** A second reader: LibreOffice prints the sheets to PDF; skipped where it is not installed. */
describe.skipIf(!installed)('LibreOffice (skipped when `soffice` is not installed)', () => {
	it.each([
		['cut-sheet', cutSheetWorkbook],
		['trim-list', trimListWorkbook]
	])(
		'opens the %s and prints it',
		async (name, write) => {
			const folder = mkdtempSync(join(tmpdir(), 'lapwing-sheets-'));
			try {
				writeFileSync(join(folder, `${name}.xlsx`), await write(sampleSnapshot()));
				const profile = `-env:UserInstallation=file://${folder}/profile`;
				const args = [profile, '--headless', '--convert-to', 'pdf', '--outdir', folder];
				execFileSync('soffice', [...args, join(folder, `${name}.xlsx`)], { timeout: 120_000 });
				const pdf = readFileSync(join(folder, `${name}.pdf`));
				expect(pdf.subarray(0, 5).toString()).toBe('%PDF-');
				// On hold, changes and two groups or elevations: at least four pages.
				expect((pdf.toString('latin1').match(/\/Type\s*\/Page\b/g) ?? []).length).toBeGreaterThan(
					3
				);
			} finally {
				rmSync(folder, { recursive: true, force: true });
			}
		},
		180_000
	);
});
