import type { Context } from '../context';
import { findShop } from '../queries/shops';
import { invariant } from '../../domain/invariant';

/** What every signed-in page shows around itself. */
export function getShopFrame(context: Context, theme: 'system' | 'light' | 'dark') {
	const shop = findShop(context.db, context.shopId);
	invariant(shop, 'the session names a shop that is gone');
	return {
		user: { name: context.userName, roles: [...context.roles] },
		shop: { name: shop.name, units: shop.units, timeZone: shop.timeZone, currency: shop.currency },
		permissions: [...context.permissions],
		theme
	};
}
