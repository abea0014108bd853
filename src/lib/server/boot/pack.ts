/** `npm run --silent pack -- FILE…`: answers problem files, one JSON result a line in input order. */
import { readFileSync } from 'node:fs';
import { answerProblem, readProblemFile } from '../../domain/solver/problem-file';
import { loadHighs } from '../../engines/highs';

const UNREADABLE = 2;

async function main(files: readonly string[]): Promise<number> {
	if (files.length === 0) {
		console.error('Name at least one problem file: npm run --silent pack -- FILE…');
		return UNREADABLE;
	}
	const engine = await loadHighs();
	let code = 0;
	for (const file of files) {
		const problems = readFile(file);
		if (problems === null) code = UNREADABLE;
		problems?.forEach((problem, index) => {
			const answer = answerProblem(problem, index, { engine, clock: () => performance.now() });
			process.stdout.write(`${JSON.stringify(answer)}\n`);
		});
	}
	return code;
}

/** The problems of one file, or null with a sentence on standard error when it cannot be read. */
function readFile(file: string): readonly unknown[] | null {
	try {
		return readProblemFile(readFileSync(file, 'utf8'));
	} catch (error) {
		console.error(`${file}: ${error instanceof Error ? error.message : String(error)}`);
		return null;
	}
}

process.exitCode = await main(process.argv.slice(2));
