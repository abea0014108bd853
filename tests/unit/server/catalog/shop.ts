import { inches, SIXTEENTH, ZERO } from '../../../../src/lib/domain/lengths/length';
import { permissionsOf } from '../../../../src/lib/server/auth/permissions';
import type { Context } from '../../../../src/lib/server/context';
import type { Database } from '../../../../src/lib/server/db/client';
import { shops, users, type Role } from '../../../../src/lib/server/db/schema/people';
import { testDatabase } from '../../../../src/lib/server/db/testing';
import { newId } from '../../../../src/lib/server/ids';

export const NOW = Date.UTC(2026, 2, 2, 15);

/** A shop with one person in it. */
export function addShop(db: Database, name: string, roles: Role[] = ['shop lead']): Context {
	const [shopId, userId] = [newId(), newId()];
	db.insert(shops)
		.values({
			id: shopId,
			name,
			precisionNm: SIXTEENTH,
			kerfNm: ZERO,
			squaringHookNm: ZERO,
			squaringFarNm: ZERO,
			minPieceNm: inches(6),
			keepOffcutNm: inches(24),
			createdAt: NOW
		})
		.run();
	db.insert(users)
		.values({
			id: userId,
			email: `${userId.toLowerCase()}@shop.test`,
			name: `Lead of ${name}`,
			createdAt: NOW
		})
		.run();
	return {
		db,
		shopId,
		shopName: name,
		userId,
		userName: `Lead of ${name}`,
		roles,
		permissions: permissionsOf(roles),
		requestId: 'request',
		now: NOW
	};
}

/** Two shops on one database: everything of the one must stay unseen by the other. */
export async function twoShops(): Promise<{ ours: Context; theirs: Context }> {
	const db = await testDatabase();
	return { ours: addShop(db, 'Ours'), theirs: addShop(db, 'Theirs') };
}
