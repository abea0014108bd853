import type { Context } from '../../context';
import { listMaterials } from '../../queries/materials';
import { listProfiles } from '../../queries/profiles';
import { listSuppliers } from '../../queries/suppliers';

/** Profiles and materials in use, as lists to choose from. */
export const pairChoices = ({ db, shopId }: Context) => ({
	profiles: listProfiles(db, shopId).map(({ id, code, name }) => ({ id, code, name })),
	materials: listMaterials(db, shopId).map(({ id, code, finish, colourName }) => ({
		id,
		code,
		name: [finish, colourName].filter(Boolean).join(', ')
	}))
});

export const supplierChoices = ({ db, shopId }: Context) =>
	listSuppliers(db, shopId).map(({ id, name }) => ({ id, name }));
