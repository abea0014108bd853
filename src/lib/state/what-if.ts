import type { Length } from '../domain/lengths/length';

/** What the server's packing says of one combination. */
export interface Refined {
	readonly pieces: number;
	readonly joints: number;
	readonly lengths: number;
	readonly costCents: number | null;
	readonly boundCents: number | null;
	readonly proven: boolean;
	readonly wasteBp: number;
	/** Runs that are not counted, each with its reason. */
	readonly left: readonly string[];
}

interface Answer {
	readonly combinations: readonly (Omit<Refined, 'left'> & {
		readonly stockLengthNm: number;
		readonly lapNm: number | null;
		readonly leftOut: readonly { readonly mark: string; readonly reason: string }[];
		readonly impossible: readonly { readonly mark: string; readonly reason: string }[];
	})[];
}

const write = ({ mark, reason }: { readonly mark: string; readonly reason: string }) =>
	`${mark}: ${reason}`;

/** Asks the server to pack every combination, and answers by the key of the choice. */
export async function askWhatIf(
	jobId: string,
	stockLengthsNm: readonly Length[],
	lapsNm: readonly Length[]
): Promise<Readonly<Record<string, Refined>>> {
	const response = await fetch('/api/v1/what-if', {
		method: 'POST',
		headers: { 'content-type': 'application/json' },
		body: JSON.stringify({ jobId, stockLengthsNm, lapsNm })
	});
	if (!response.ok) throw new Error(`the comparison was refused with ${response.status}`);
	const { combinations } = (await response.json()) as Answer;
	return Object.fromEntries(
		combinations.map(({ stockLengthNm, lapNm, leftOut, impossible, ...figures }) => [
			`${stockLengthNm}/${lapNm ?? ''}`,
			{ ...figures, left: [...leftOut, ...impossible].map(write) }
		])
	);
}
