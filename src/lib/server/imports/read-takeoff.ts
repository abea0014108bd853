import { Worker } from 'node:worker_threads';
import { resolve } from 'node:path';
import { FileRefused, LIMITS, type ReadSheet } from './limits';
import type { WorkerAnswer } from './read-takeoff.worker';

const ACCEPTED = 'accepted are .xlsx, .csv and .tsv files';

const startsWith = (bytes: Uint8Array, ...start: number[]) =>
	start.every((byte, index) => bytes[index] === byte);

/** What a file is by its first bytes; its name and what the browser says of it count for nothing. */
export function kindOf(bytes: Uint8Array): 'xlsx' | 'csv' {
	if (bytes.length === 0) throw new FileRefused(`The file is empty; ${ACCEPTED}.`);
	if (bytes.length > LIMITS.fileBytes)
		throw new FileRefused(
			`The file has ${(bytes.length / 1e6).toFixed(1)} MB; accepted are at most ${LIMITS.fileBytes / 1e6} MB.`
		);
	if (startsWith(bytes, 0x50, 0x4b, 0x03, 0x04)) return 'xlsx';
	if (startsWith(bytes, 0xd0, 0xcf, 0x11, 0xe0))
		throw new FileRefused('The file is an old .xls workbook; save it as .xlsx and import that.');
	if (startsWith(bytes, 0x4d, 0x5a) || startsWith(bytes, 0x7f, 0x45, 0x4c, 0x46))
		throw new FileRefused(`The file is a program, whatever its name says; ${ACCEPTED}.`);
	if (startsWith(bytes, 0x25, 0x50, 0x44, 0x46))
		throw new FileRefused(`The file is a PDF; ${ACCEPTED}.`);
	return 'csv';
}

export interface WorkerPlace {
	readonly file: string;
}
/** Where `npm run build` puts it; read at each call, since the environment may name another. */
const built = (): WorkerPlace => ({
	file: resolve(process.env.TAKEOFF_WORKER ?? 'worker-dist/read-takeoff.worker.js')
});

/**
 * Rows of a takeoff file, read in a thread with limits of memory and time.
 * @throws FileRefused with one sentence for the person; nothing else for whatever the file holds.
 */
export async function readTakeoff(
	bytes: Uint8Array,
	place: WorkerPlace = built()
): Promise<ReadSheet> {
	const kind = kindOf(bytes);
	const worker = new Worker(place.file, {
		workerData: { bytes, kind },
		resourceLimits: {
			maxOldGenerationSizeMb: LIMITS.heapMb,
			maxYoungGenerationSizeMb: 32,
			stackSizeMb: 4
		}
	});
	try {
		const answer = await firstAnswer(worker);
		if (!answer.ok) throw new FileRefused(answer.sentence);
		return answer.sheet;
	} finally {
		await worker.terminate();
	}
}

function firstAnswer(worker: Worker): Promise<WorkerAnswer> {
	return new Promise((done, failed) => {
		const timer = setTimeout(
			() =>
				failed(
					new FileRefused(
						`The file takes longer than ${LIMITS.wallClockMs / 1000} seconds to read; keep only the takeoff sheet.`
					)
				),
			LIMITS.wallClockMs
		);
		const end = (act: () => void) => {
			clearTimeout(timer);
			act();
		};
		worker.once('message', (answer: WorkerAnswer) => end(() => done(answer)));
		worker.once('error', (cause: NodeJS.ErrnoException) =>
			end(() =>
				failed(
					cause.code === 'ERR_WORKER_OUT_OF_MEMORY'
						? new FileRefused(
								'The file needs more memory than a takeoff may; keep only the takeoff sheet.'
							)
						: cause
				)
			)
		);
		worker.once('exit', () =>
			end(() => failed(new FileRefused('The file could not be read to its end.')))
		);
	});
}
