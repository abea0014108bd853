import type { Kept } from './grid-sync';

const isKept = (value: unknown): value is Kept =>
	typeof value === 'object' && value !== null && 'rows' in value && 'removed' in value;

/** Keeps a job's unsaved rows in this tab until they are saved; a full or closed store loses only the copy. */
export function keptStore(jobId: string) {
	const key = `lapwing-unsaved-${jobId}`;
	return {
		load(): Kept | null {
			const text = sessionStorage.getItem(key);
			if (text === null) return null;
			const value: unknown = JSON.parse(text);
			return isKept(value) ? value : null;
		},
		save(kept: Kept | null): void {
			if (kept === null) sessionStorage.removeItem(key);
			else sessionStorage.setItem(key, JSON.stringify(kept));
		}
	};
}
