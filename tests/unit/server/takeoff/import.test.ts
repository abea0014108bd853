import { resolve } from 'node:path';
import { build } from 'vite';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { correctForm, mappingForm } from '../../../../src/lib/forms/import';
import { findJob, type Job } from '../../../../src/lib/server/queries/jobs';
import { listRuns } from '../../../../src/lib/server/queries/runs';
import { listElevations } from '../../../../src/lib/server/queries/elevations';
import {
	correctRow,
	getImports,
	setRowAside,
	takeImport,
	undoImport,
	uploadTakeoff
} from '../../../../src/lib/server/services/import-takeoff';
import { testShop, type TestShop } from '../../../support/demo-shop';

let shop: TestShop;
let job: Job;
const folder = resolve('node_modules/.lapwing/import-worker');
beforeAll(async () => {
	await build({
		configFile: 'src/lib/server/jobs/vite.worker.config.ts',
		logLevel: 'error',
		build: { outDir: folder }
	});
});
beforeEach(async () => {
	shop = await testShop();
	job = findJob(shop.db, shop.staff.shopId, shop.jobId)!;
});

const CSV = [
	'Elevation,Run,Profile,Metal,Length,Qty,Left,Right,Remarks',
	`N,X01,HF,ST24-SG31,"14'-7 3/4""",1,closed,open,"first, of two"`,
	'N,X02,HF,ST24-SG31,9 3/7,2,closed,open,',
	'Roof Garden,X03,DE,ST24-SG31,120,1,open,open,',
	'N,X04,GUTTER,ST24-SG31,10 ft,1,open,sideways,',
	'N,X01,HF,ST24-SG31,10 ft,1,open,open,same mark',
	''
].join('\n');

async function uploaded(text = CSV) {
	const outcome = await uploadTakeoff(shop.as('estimator'), job, {
		name: 'takeoff.csv',
		bytes: new TextEncoder().encode(text)
	});
	if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
	return outcome.value.id;
}
const open = (id: string) => getImports(shop.as('estimator'), job, id).open!;
const mapped = (id: string, more: Record<string, string> = {}) => {
	const columns = Object.entries(open(id).mapping).map(([header, at]) => [
		`column-${header}`,
		at === null ? '' : String(at)
	]);
	return mappingForm.parse({
		importId: id,
		...Object.fromEntries(columns),
		addElevations: 'yes',
		...more
	});
};
const runs = () => listRuns(shop.db, shop.staff.shopId, job.id);

describe('importing a takeoff', () => {
	process.env.TAKEOFF_WORKER = resolve(folder, 'read-takeoff.worker.js');

	it('recognises headings, and says row by row what does not read before anything is taken', async () => {
		const before = runs().length;
		const id = await uploaded();
		const shown = open(id);
		expect(shown.mapping).toMatchObject({ elevation: 0, mark: 1, material: 3, face: 4, note: 8 });
		expect([shown.good, shown.rows]).toEqual([2, 5]);
		const bad = shown.preview.filter((row) => row.problems.length > 0);
		expect(bad.map((row) => [row.rowNumber, row.problems.map((p) => p.column)])).toEqual([
			[3, ['face']],
			[5, ['profile', 'right']],
			[6, ['mark']]
		]);
		expect(runs()).toHaveLength(before);
	});

	it('takes good rows in one transaction, keeps bad ones, and takes those when put right', async () => {
		const before = runs().length;
		const id = await uploaded();
		const outcome = takeImport(shop.as('estimator'), job, mapped(id));
		expect(outcome).toEqual({ kind: 'done', value: { taken: 2, bad: 3 } });
		expect(runs()).toHaveLength(before + 2);
		const added = listElevations(shop.db, shop.staff.shopId, job.id).at(-1)!;
		expect([added.code, added.name]).toEqual(['RG', 'Roof Garden']);
		const [bad] = open(id).bad;
		const cells = Object.fromEntries(
			Object.entries(bad!.texts).map(([header, text]) => [`cell-${header}`, text])
		);
		const body = { importId: id, rowId: bad!.id, ...cells };
		const still = correctRow(shop.as('estimator'), job, correctForm.parse(body));
		expect(still).toMatchObject({
			kind: 'refused',
			problems: [{ sentence: expect.stringContaining('Row 3: Length of X02') as string }]
		});
		const right = correctRow(
			shop.as('estimator'),
			job,
			correctForm.parse({ ...body, 'cell-face': '9 7/16' })
		);
		expect(right).toEqual({ kind: 'done', value: { mark: 'X02' } });
		expect(runs().find((run) => run.mark === 'X02')).toMatchObject({
			faceTyped: '9 7/16',
			count: 2,
			leftKind: 'closed',
			hold: true
		});
		expect(open(id).bad).toHaveLength(2);
		setRowAside(shop.as('estimator'), job, id, open(id).bad[0]!.id);
		expect(open(id)).toMatchObject({ setAside: 1, taken: 3 });
		const listed = getImports(shop.as('estimator'), job, id).imports;
		expect(listed).toMatchObject([{ id, taken: 3, bad: 1 }]);
		expect(takeImport(shop.as('estimator'), job, mapped(id)).kind).toBe('refused');
	});

	it('is undone whole', async () => {
		const before = runs().map((run) => run.id);
		const id = await uploaded();
		takeImport(shop.as('estimator'), job, mapped(id));
		expect(undoImport(shop.as('estimator'), job, id)).toEqual({
			kind: 'done',
			value: { removed: 2 }
		});
		expect(runs().map((run) => run.id)).toEqual(before);
		expect(open(id).state).toBe('undone');
	});

	it('remembers which heading the shop meant', async () => {
		const odd = 'Ref,Span,Trim,Metal\nY01,10 ft,HF,ST24-SG31\n';
		const id = await uploaded(odd);
		expect(open(id).mapping.face).toBeNull();
		takeImport(
			shop.as('estimator'),
			job,
			mapped(id, { 'column-mark': '0', 'column-face': '1', elevation: 'N' })
		);
		expect(runs().find((run) => run.mark === 'Y01')?.faceTyped).toBe('10 ft');
		const again = await uploaded(odd.replace('Y01', 'Y02'));
		expect(open(again).mapping).toMatchObject({ mark: 0, face: 1, profile: 2 });
	});

	it('refuses a hostile file with a sentence that names it', async () => {
		const outcome = await uploadTakeoff(shop.as('estimator'), job, {
			name: 'takeoff.xlsx',
			bytes: new TextEncoder().encode('MZ not a workbook')
		});
		expect(outcome).toMatchObject({
			kind: 'refused',
			problems: [{ field: 'file', sentence: expect.stringContaining('is a program') as string }]
		});
	});
});
