/**
 * What a phone keeps: the last-read trim lists and the acts not yet sent. A cache and an outbox, nothing
 * else; wiped when the person signs out.
 */
import { deleteDB, openDB, type DBSchema, type IDBPDatabase } from 'idb';
import type { SiteAct } from '../../forms/site';
import type { SiteList } from '../../forms/site-list';

export const STORE_NAME = 'lapwing-site';
/** Tells pages that never open the store whether there is one to wipe. */
const FLAG = 'lapwing-site';

export interface KeptAct {
	readonly seq?: number;
	readonly viewer: string;
	readonly act: SiteAct;
	/** Why the server refused it; kept until the person puts it aside. */
	readonly refusal: string;
}

interface SiteSchema extends DBSchema {
	lists: { key: string; value: SiteList };
	acts: { key: number; value: KeptAct };
}

let opened: Promise<IDBPDatabase<SiteSchema>> | null = null;

function open(): Promise<IDBPDatabase<SiteSchema>> {
	opened ??= openDB<SiteSchema>(STORE_NAME, 1, {
		upgrade(db) {
			db.createObjectStore('lists');
			db.createObjectStore('acts', { keyPath: 'seq', autoIncrement: true });
		},
		// Another tab, or the service worker on sign-out, wants to delete it: let go.
		blocking: (_, __, event) => (event.target as unknown as { close(): void }).close(),
		terminated: () => (opened = null)
	});
	localStorage.setItem(FLAG, 'kept');
	return opened;
}

export const hasStore = (): boolean => localStorage.getItem(FLAG) !== null;
const keyOf = (jobId: string, elevationId: string) => `${jobId}.${elevationId}`;

/** Keeps a list as last read; lists of somebody else on this device go. */
export async function keepList(list: SiteList): Promise<void> {
	const db = await open();
	const tx = db.transaction('lists', 'readwrite');
	for (const key of await tx.store.getAllKeys())
		if ((await tx.store.get(key))!.viewer !== list.viewer) await tx.store.delete(key);
	await tx.store.put(list, keyOf(list.job.id, list.elevation.id));
	await tx.done;
}

export const findKeptList = async (
	jobId: string,
	elevationId: string
): Promise<SiteList | undefined> => (await open()).get('lists', keyOf(jobId, elevationId));

export const listKeptLists = async (): Promise<SiteList[]> => (await open()).getAll('lists');

/** Acts in the order they were done. */
export const listActs = async (): Promise<KeptAct[]> => (await open()).getAll('acts');

export const keepAct = async (kept: KeptAct): Promise<number> => (await open()).add('acts', kept);

export async function settleActs(
	settled: readonly { readonly seq: number; readonly refusal: string | null }[]
): Promise<void> {
	const tx = (await open()).transaction('acts', 'readwrite');
	for (const { seq, refusal } of settled) {
		const kept = await tx.store.get(seq);
		if (!kept) continue;
		if (refusal === null) await tx.store.delete(seq);
		else await tx.store.put({ ...kept, refusal });
	}
	await tx.done;
}

/** Deletes everything kept on this device. */
export async function wipeStore(): Promise<void> {
	const db = await opened?.catch(() => null);
	db?.close();
	opened = null;
	localStorage.removeItem(FLAG);
	await deleteDB(STORE_NAME);
}
