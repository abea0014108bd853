import type { EndKind } from '../domain/profiles/ends';
import { m } from '../paraglide/messages';

const WORDS: Readonly<Record<EndKind, () => string>> = {
	open: m.catalog_end_kind_open,
	closed: m.catalog_end_kind_closed,
	'end-dam': m.catalog_end_kind_dam,
	'corner-outside': m.catalog_end_kind_corner_outside,
	'corner-inside': m.catalog_end_kind_corner_inside,
	butt: m.catalog_end_kind_butt,
	'laps-next': m.catalog_end_kind_laps_next
};

/** Returns what a kind of end is called, without how it is closed. */
export const endKindWords = (kind: EndKind): string => WORDS[kind]();
