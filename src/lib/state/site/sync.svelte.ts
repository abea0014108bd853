/** The installer's work on one elevation: the list as read, the acts not yet sent, and the word that says so. */
import type { ActAnswer, FittedAct, MeasureAct, SiteAct } from '../../forms/site';
import type { SiteList } from '../../forms/site-list';
import { afterAnswers, fittedNow } from './overlay';
import { postActs, sendKeptActs, type Sent } from './send';
import { keepAct, keepList, listActs, settleActs, type KeptAct } from './store';
import { tapFilter } from './taps';

export type SyncState = 'saved' | 'saving' | 'offline' | 'signed-out';
type Draft<T extends SiteAct> = Omit<T, 'opId' | 'jobId' | 'at' | 'kind'>;

const RETRY_MS = 15_000;

/** 128 random bits: the act's name, made where it is done. */
function newOpId(): string {
	const bytes = crypto.getRandomValues(new Uint8Array(16));
	return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

export class SiteSync {
	list = $state.raw<SiteList>() as SiteList;
	acts = $state.raw<readonly KeptAct[]>([]);
	state = $state<SyncState>('saved');
	savedAt = $state(0);
	/** What the last measures did, by run id. */
	said = $state.raw<Readonly<Record<string, string>>>({});
	/** False where the browser refuses storage; acts then live until the page closes. */
	kept = $state(true);

	readonly pending = $derived(this.acts.filter((act) => act.refusal === '').length);
	readonly refused = $derived(this.acts.filter((act) => act.refusal !== ''));
	readonly fitted = $derived(fittedNow(this.list, this.acts));

	#sending: Promise<void> | null = null;
	#counts = tapFilter();

	constructor(list: SiteList) {
		this.list = list;
		this.savedAt = list.readAt;
	}

	/** Starts keeping and sending; returns what stops it. */
	start(): () => void {
		const wake = () => void this.flush();
		const seen = () => document.visibilityState === 'visible' && wake();
		const timer = setInterval(wake, RETRY_MS);
		window.addEventListener('online', wake);
		window.addEventListener('offline', wake);
		document.addEventListener('visibilitychange', seen);
		void this.#begin();
		return () => {
			clearInterval(timer);
			window.removeEventListener('online', wake);
			window.removeEventListener('offline', wake);
			document.removeEventListener('visibilitychange', seen);
		};
	}

	/** A newer list from the server takes the place of the one shown. */
	show(list: SiteList): void {
		const same = list.elevation.id === this.list.elevation.id;
		if (same && list.readAt < this.list.readAt) return;
		this.list = list;
		this.savedAt = Math.max(this.savedAt, list.readAt);
		void this.#keep(() => keepList(list));
	}

	/** Ticks pieces or takes it back; a second tap within 400 ms is the same tap. */
	async mark(key: string, input: Draft<FittedAct>): Promise<void> {
		if (!this.#counts(key) || input.pieceIds.length === 0) return;
		await this.#add({ kind: 'fitted', ...this.#named(), ...input });
	}

	async measure(input: Draft<MeasureAct>): Promise<void> {
		if (!this.#counts(`measure ${input.runId} ${input.measure}`)) return;
		await this.#add({ kind: 'measure', ...this.#named(), ...input });
	}

	/** Puts refused acts aside once they have been read. */
	async putAside(): Promise<void> {
		const seqs = this.refused.map((kept) => kept.seq!);
		this.acts = this.acts.filter((kept) => kept.refusal === '');
		await this.#keep(() => settleActs(seqs.map((seq) => ({ seq, refusal: null }))));
	}

	/** Sends what is kept, one try at a time. */
	flush(): Promise<void> {
		this.#sending ??= this.#send().finally(() => (this.#sending = null));
		return this.#sending;
	}

	#named = () => ({ opId: newOpId(), jobId: this.list.job.id, at: Date.now() });

	async #begin(): Promise<void> {
		await this.#keep(() => keepList(this.list));
		await this.#reload();
		await this.flush();
	}

	async #add(act: SiteAct): Promise<void> {
		const kept: KeptAct = { viewer: this.list.viewer, act, refusal: '' };
		this.acts = [...this.acts, kept];
		await this.#keep(() => keepAct(kept));
		await this.#reload();
		// A try under way may have read the queue before this act was in it.
		await this.#sending;
		await this.flush();
	}

	async #send(): Promise<void> {
		if (this.pending === 0 && navigator.onLine) {
			if (this.state !== 'saved') await this.#refresh();
			return;
		}
		this.state = navigator.onLine ? 'saving' : 'offline';
		if (!navigator.onLine) return;
		const sent = this.kept ? await sendKeptActs(this.list.viewer) : await this.#sendUnkept();
		await this.#reload();
		if (sent.state !== 'sent') {
			this.state = sent.state;
			return;
		}
		this.#hear(sent.answers);
		await this.#refresh();
	}

	/** Where the browser refuses storage the acts go from memory. */
	async #sendUnkept(): Promise<Sent> {
		const sending = this.acts.filter((kept) => kept.refusal === '');
		for (const { act } of sending) if (act.kind === 'measure') this.#runOf[act.opId] = act.runId;
		const sent = await postActs(sending.map((kept) => kept.act));
		if (sent.state !== 'sent') return sent;
		this.acts = afterAnswers(this.acts, sending, sent.answers);
		return sent;
	}

	/** The sentence each measure was answered with, for its run. */
	#hear(answers: readonly ActAnswer[]): void {
		for (const { opId, sentence } of answers) {
			const runId = this.#runOf[opId];
			if (runId && sentence !== '') this.said = { ...this.said, [runId]: sentence };
		}
	}
	#runOf: Record<string, string> = {};

	async #refresh(): Promise<void> {
		const { job, elevation } = this.list;
		try {
			const response = await fetch(`/api/v1/site/${job.id}/${elevation.id}`);
			if (response.status === 401 || response.status === 403) this.state = 'signed-out';
			if (!response.ok) return;
			this.show((await response.json()) as SiteList);
			this.state = 'saved';
			this.savedAt = this.list.readAt;
		} catch (cause) {
			if (!(cause instanceof TypeError)) throw cause;
			this.state = 'offline';
		}
	}

	/** Reads the queue anew; another tab may have added to it or sent it. */
	async #reload(): Promise<void> {
		await this.#keep(async () => {
			const own = (await listActs()).filter((kept) => kept.viewer === this.list.viewer);
			for (const { act } of own) if (act.kind === 'measure') this.#runOf[act.opId] = act.runId;
			this.acts = own;
		});
	}

	async #keep(work: () => Promise<unknown>): Promise<void> {
		try {
			await work();
		} catch (cause) {
			// A browser that refuses storage says so with a DOMException; anything else is a fault of ours.
			if (!(cause instanceof DOMException)) throw cause;
			this.kept = false;
		}
	}
}
