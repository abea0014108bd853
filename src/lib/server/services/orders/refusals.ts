import type { Context } from '../../context';
import type { Conflict } from '../../http/problem';
import { refused, type Outcome } from '../outcome';
import { readOrder, type OrderView } from './read-order';

/** One field's refusal, as a sentence. */
export const refusedAt = (field: string, sentence: string): Outcome<never> =>
	refused([{ field, sentence }]);

/** Somebody else saved first: what was asked, and the order as it is now. */
export const conflict = (
	ctx: Context,
	id: string,
	yours: { readonly version: number }
): Conflict<OrderView | undefined> => ({ kind: 'conflict', yours, theirs: readOrder(ctx, id) });
