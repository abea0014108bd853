import { m } from '$lib/paraglide/messages';

export type OrderState = 'draft' | 'sent' | 'part received' | 'received' | 'cancelled';
export type MessageState = 'waiting' | 'sending' | 'sent' | 'failed';
export type Tone = 'good' | 'open' | 'stop' | 'plain';

const ORDER: Readonly<Record<OrderState, { tone: Tone; word: () => string }>> = {
	draft: { tone: 'plain', word: m.buy_state_draft },
	sent: { tone: 'open', word: m.buy_state_sent },
	'part received': { tone: 'open', word: m.buy_state_part },
	received: { tone: 'good', word: m.buy_state_received },
	cancelled: { tone: 'plain', word: m.buy_state_cancelled }
};
const MESSAGE: Readonly<Record<MessageState, { tone: Tone; word: () => string }>> = {
	waiting: { tone: 'open', word: m.buy_message_waiting },
	sending: { tone: 'open', word: m.buy_message_sending },
	sent: { tone: 'good', word: m.buy_message_sent },
	failed: { tone: 'stop', word: m.buy_message_failed }
};

const inWords = ({ tone, word }: { tone: Tone; word: () => string }) => ({ tone, word: word() });

export const orderState = (state: OrderState) => inWords(ORDER[state]);
export const messageState = (state: MessageState) => inWords(MESSAGE[state]);

/** A moment in the shop's time zone. */
export const when = (at: number, timeZone: string): string =>
	new Intl.DateTimeFormat('en-US', { dateStyle: 'medium', timeStyle: 'short', timeZone }).format(
		at
	);
