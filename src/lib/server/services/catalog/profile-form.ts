import { basisOf } from '../../../forms/read-profile';
import type { How } from '../../../forms/profile';
import { isId } from '../../../forms/id';
import type { Context } from '../../context';
import { findMaterial, listMaterials } from '../../queries/materials';
import { unitsOf } from './units';

/** How a posted profile is read: the shop's units, and the material its figures are for. */
export const profileReading = (context: Context): How => ({
	units: unitsOf(context),
	basisFor: (id) => {
		if (typeof id !== 'string' || !isId(id)) return null;
		const material = findMaterial(context.db, context.shopId, id);
		return material ? basisOf(material.metal, material.thicknessNm) : null;
	}
});

/** What the editor's figures need to know of each material. */
export const figureMaterials = ({ db, shopId }: Context) =>
	listMaterials(db, shopId).map((row) => ({
		id: row.id,
		code: row.code,
		metal: row.metal,
		thicknessNm: row.thicknessNm,
		gramsPerSquareMetre: row.gramsPerSquareMetre
	}));
