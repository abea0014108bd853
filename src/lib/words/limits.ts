import type { LimitKind } from '$lib/domain/takeoff/takeoff';
import { m } from '$lib/paraglide/messages';

/** What governs the longest piece. */
export const limitWord = (kind: LimitKind): string =>
	({
		stock: m.takeoff_limit_stock(),
		brake: m.takeoff_limit_brake(),
		shear: m.takeoff_limit_shear(),
		specification: m.takeoff_limit_specification(),
		handling: m.takeoff_limit_handling()
	})[kind];
