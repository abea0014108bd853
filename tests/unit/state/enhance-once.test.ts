import { beforeEach, expect, it, vi } from 'vitest';

type Submit = (input: unknown) => Promise<((answer: unknown) => Promise<void>) | undefined>;
let submit: Submit;
vi.mock('$app/forms', () => ({
	enhance: (_form: unknown, given: Submit) => {
		submit = given;
		return { destroy() {} };
	}
}));

const { enhance } = await import('../../../src/lib/state/enhance-once');
const input = () => ({ cancel: vi.fn() });
const SUCCESS = { type: 'success', status: 200 };
const answer = (result: unknown = SUCCESS) => ({ result, update: vi.fn(async () => {}) });

beforeEach(() => enhance({} as HTMLFormElement));

it('a second click while the first is on its way sends nothing', async () => {
	const [first, second, third] = [input(), input(), input()];
	const done = await submit(first);
	await submit(second);
	expect(first.cancel).not.toHaveBeenCalled();
	expect(second.cancel).toHaveBeenCalledOnce();
	const told = answer();
	await done!(told);
	expect(told.update).toHaveBeenCalledOnce();
	await submit(third);
	expect(third.cancel).not.toHaveBeenCalled();
});

it('a page that fails to follow does not lock the form', async () => {
	const done = await submit(input());
	const update = vi.fn(async () => Promise.reject(new Error('no page')));
	await expect(done!({ update, result: SUCCESS })).rejects.toThrow('no page');
	const again = input();
	await submit(again);
	expect(again.cancel).not.toHaveBeenCalled();
});

it('a form that its own page holds back can be sent later', async () => {
	let hold = true;
	enhance({} as HTMLFormElement, ({ cancel }) => {
		if (hold) cancel();
	});
	const held = input();
	await submit(held);
	expect(held.cancel).toHaveBeenCalledOnce();
	hold = false;
	const later = input();
	await submit(later);
	expect(later.cancel).not.toHaveBeenCalled();
});

it('a form that the server did not answer stays, and its page is not replaced', async () => {
	const done = await submit(input());
	const told = answer({ type: 'error', error: new TypeError('Failed to fetch') });
	await done!(told);
	expect(told.update).not.toHaveBeenCalled();
	const again = input();
	await submit(again);
	expect(again.cancel).not.toHaveBeenCalled();
});
