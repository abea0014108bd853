import { m } from '../paraglide/messages';

const STATES = {
	'on hand': m.catalog_state_on_hand,
	used: m.catalog_state_used,
	scrapped: m.catalog_state_scrapped,
	returned: m.catalog_state_returned
} as const;
const KINDS = { stick: m.catalog_kind_stick, offcut: m.catalog_kind_offcut } as const;

export type MetalStateWord = keyof typeof STATES;
export const METAL_STATES = Object.keys(STATES) as MetalStateWord[];

export const metalStateWords = (state: MetalStateWord): string => STATES[state]();
export const metalKindWords = (kind: keyof typeof KINDS): string => KINDS[kind]();
