import { and, eq, gt, isNull } from 'drizzle-orm';
import type { Queryable } from '../db/client';
import { passwordResets, users } from '../db/schema/people';

const open = (now: number) => and(isNull(passwordResets.usedAt), gt(passwordResets.expiresAt, now));

export function insertPasswordReset(db: Queryable, row: typeof passwordResets.$inferInsert): void {
	db.insert(passwordResets).values(row).run();
}

export function findOpenReset(db: Queryable, tokenHash: string, now: number) {
	return db
		.select({ id: passwordResets.id, userId: users.id, email: users.email })
		.from(passwordResets)
		.innerJoin(users, eq(users.id, passwordResets.userId))
		.where(and(eq(passwordResets.tokenHash, tokenHash), isNull(users.disabledAt), open(now)))
		.get();
}

/** Uses the link up if it still is open: of two at the same moment one wins. */
export function claimReset(db: Queryable, id: string, now: number): boolean {
	return (
		db
			.update(passwordResets)
			.set({ usedAt: now })
			.where(and(eq(passwordResets.id, id), open(now)))
			.run().changes === 1
	);
}

/** Earlier links of the person stop working. */
export function closeResetsOf(db: Queryable, userId: string, now: number): void {
	db.update(passwordResets)
		.set({ usedAt: now })
		.where(and(eq(passwordResets.userId, userId), open(now)))
		.run();
}
