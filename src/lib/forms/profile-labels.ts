import { m } from '../paraglide/messages';

/** What the lines of a draft (`draftLines`) are called on the form. */
export const profileLabels = (): Record<string, string> => ({
	code: m.catalog_code(),
	name: m.catalog_name(),
	kind: m.catalog_kind(),
	legs: m.catalog_legs(),
	startHem: m.catalog_start_hem(),
	endHem: m.catalog_end_hem(),
	insideRadius: m.catalog_inside_radius(),
	finished: m.catalog_finished_side(),
	heading: m.catalog_heading(),
	girth: m.catalog_girth_method(),
	closure: m.catalog_ends_closed_by(),
	ends: m.catalog_ends(),
	jointKind: m.catalog_joint_kind(),
	lap: m.catalog_lap(),
	gap: m.catalog_gap(),
	plate: m.catalog_plate(),
	lapOver: m.catalog_lap_over(),
	concealed: m.catalog_concealed()
});
