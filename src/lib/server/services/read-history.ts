import type { Context } from '../context';
import { historyFilters, listHistory } from '../queries/history';
import { findShop } from '../queries/shops';
import { formatTime } from '../../times';

export const HISTORY_PAGE = 50;

export interface HistoryFilter {
	readonly entity?: string;
	readonly userId?: string;
	readonly beforeId?: number;
}

/** One page of the shop's history, newest first, with what it can be filtered by. */
export function readHistory(context: Context, filter: HistoryFilter) {
	const { db, shopId } = context;
	const zone = findShop(db, shopId)?.timeZone ?? 'UTC';
	const rows = listHistory(db, shopId, { ...filter, limit: HISTORY_PAGE + 1 });
	const page = rows.slice(0, HISTORY_PAGE);
	return {
		zone,
		entries: page.map(({ id, at, who, summary, action, entity }) => ({
			id,
			at: formatTime(at, zone),
			who,
			action,
			entity,
			summary
		})),
		olderThan: rows.length > HISTORY_PAGE ? page.at(-1)!.id : null,
		...historyFilters(db, shopId)
	};
}
