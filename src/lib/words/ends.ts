import type { EndKind } from '$lib/domain/takeoff/takeoff';
import { m } from '$lib/paraglide/messages';

/** An end in the trade's words. */
export const endWord = (kind: EndKind): string =>
	({
		open: m.takeoff_end_open(),
		closed: m.takeoff_end_closed(),
		'end-dam': m.takeoff_end_dam(),
		'corner-outside': m.takeoff_end_corner_outside(),
		'corner-inside': m.takeoff_end_corner_inside(),
		butt: m.takeoff_end_butt(),
		'laps-next': m.takeoff_end_laps_next()
	})[kind];
