import { invariant } from '../../../domain/invariant';
import type { UnitSystem } from '../../../domain/lengths/units';
import type { Context } from '../../context';
import { findShop } from '../../queries/shops';

/** The shop's system: what a bare number means on the pages of its catalog. */
export function unitsOf(context: Context): UnitSystem {
	const shop = findShop(context.db, context.shopId);
	invariant(shop, 'the session names a shop that is gone');
	return shop.units;
}
