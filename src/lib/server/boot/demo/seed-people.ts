import { invariant } from '../../../domain/invariant';
import type { Queryable } from '../../db/client';
import { ROLES, type Role } from '../../db/schema/people';
import { newId } from '../../ids';
import { insertRows } from '../../queries/seed';
import { DEMO_PEOPLE, DEMO_SHOP } from './shop';

interface DemoPerson {
	readonly id: string;
	readonly name: string;
	readonly email: string;
	readonly roles: readonly Role[];
}

export interface DemoStaff {
	readonly shopId: string;
	readonly shopName: string;
	readonly people: readonly DemoPerson[];
	/** Who holds a role; the demo has one person for each. */
	readonly byRole: Readonly<Record<Role, DemoPerson>>;
}

/** The shop and its five people, one for each role. */
export function seedPeople(tx: Queryable, passwordHash: string, now: number): DemoStaff {
	const shopId = newId();
	const people = DEMO_PEOPLE.map((person) => ({ ...person, id: newId() }));
	insertRows(tx, 'shops', [{ ...DEMO_SHOP, id: shopId, createdAt: now }]);
	insertRows(
		tx,
		'users',
		people.map(({ id, email, name }) => ({ id, email, name, passwordHash, createdAt: now }))
	);
	insertRows(
		tx,
		'memberships',
		people.flatMap(({ id, roles }) =>
			roles.map((role) => ({ userId: id, shopId, role, createdAt: now }))
		)
	);
	return { shopId, shopName: DEMO_SHOP.name, people, byRole: byRole(people) };
}

function byRole(people: readonly DemoPerson[]): Record<Role, DemoPerson> {
	const found = ROLES.map((role) => {
		const person = people.find(({ roles }) => roles.includes(role));
		invariant(person, `nobody in the demo is ${role}`);
		return [role, person] as const;
	});
	return Object.fromEntries(found) as Record<Role, DemoPerson>;
}
