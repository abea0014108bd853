import type { Batch } from './grid-sync';
import type { LoadedRun, SendAnswer } from './takeoff.svelte';

interface Named {
	readonly id: string;
	readonly code: string;
}

/** What turns ids of stored runs into what the cells show. */
export interface RunNames {
	readonly profiles: readonly Named[];
	readonly materials: readonly Named[];
	readonly units: readonly { readonly id: string; readonly mark: string }[];
}

type ServerRun = Omit<LoadedRun, 'unitMark' | 'profileCode' | 'materialCode'> & {
	readonly unitId: string | null;
	readonly profileId: string;
	readonly materialId: string;
	readonly deletedAt?: number | null;
};

/** A stored run with the names that its cells show. */
export const toLoaded = (run: ServerRun, names: RunNames): LoadedRun => ({
	...run,
	unitMark: names.units.find((one) => one.id === run.unitId)?.mark ?? '',
	profileCode: names.profiles.find((one) => one.id === run.profileId)?.code ?? '',
	materialCode: names.materials.find((one) => one.id === run.materialId)?.code ?? ''
});

const failed = (sentence: string, offline: boolean): SendAnswer => ({
	kind: 'failed',
	sentence,
	offline
});

/** Sends a batch to the API and sorts its answer; never throws. */
export async function sendRuns(jobId: string, batch: Batch, names: RunNames): Promise<SendAnswer> {
	let response: Response;
	try {
		response = await fetch(`/api/v1/jobs/${jobId}/runs`, {
			method: 'PATCH',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify(batch)
		});
	} catch (cause) {
		if (!(cause instanceof TypeError)) throw cause;
		return failed('The server cannot be reached; it will be tried again.', true);
	}
	if (response.ok) return { kind: 'saved', value: await response.json() };
	if (response.status === 409) return toConflict(await response.json(), names);
	if (response.status === 400)
		return { kind: 'refused', problems: (await response.json()).problems ?? [] };
	if (response.status === 401)
		return failed('You are signed out; sign in in another tab and this goes on.', false);
	if (response.status === 403)
		return failed('Your roles in this shop do not allow changing runs.', false);
	return failed('The server did not save this; it will be tried again.', false);
}

function toConflict(
	body: { theirs: readonly { id: string; row: ServerRun }[] },
	names: RunNames
): SendAnswer {
	return {
		kind: 'conflict',
		theirs: body.theirs.map(({ id, row }) => ({
			id,
			version: row.version,
			row: row.deletedAt ? null : toLoaded(row, names)
		}))
	};
}
