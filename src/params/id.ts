import type { ParamMatcher } from '@sveltejs/kit';
import { isId } from '$lib/forms/id';

/** Opaque identifiers as `newId()` makes them; anything else is a 404 before code runs. */
export const match: ParamMatcher = (value) => isId(value);
