import { describe, expect, it } from 'vitest';
import { whyNotSaved } from '../../../src/lib/state/not-saved.svelte';

describe('why a form was not saved', () => {
	it('says nothing while the server has answered the form itself', () => {
		expect(whyNotSaved({ type: 'success', status: 200 })).toBeNull();
		expect(whyNotSaved({ type: 'failure', status: 400 })).toBeNull();
		expect(whyNotSaved({ type: 'redirect', status: 303, location: '/jobs/x' })).toBeNull();
		expect(whyNotSaved({ type: 'redirect', status: 303, location: '/sign-in' })).toBeNull();
	});

	it('keeps the form when no answer came, the server failed or the session ended', () => {
		expect(whyNotSaved({ type: 'error', error: new TypeError('Failed to fetch') })).toBe(
			'Not saved: the server did not answer. What you typed is still here; try again.'
		);
		expect(
			whyNotSaved({ type: 'error', status: 500, error: { message: 'Something failed.' } })
		).toBe('Not saved: Something failed. What you typed is still here.');
		expect(
			whyNotSaved({ type: 'redirect', status: 303, location: '/sign-in?next=%2Fjobs%2Fnew' })
		).toContain('you are signed out');
	});
});
