import { inches, length, SIXTEENTH } from '../../../domain/lengths/length';
import type { Role } from '../../db/schema/people';

/** The demo's shop and people are invented; `.example` addresses reach nobody. */
export const DEMO_SHOP = {
	name: 'Tarnbridge Canopy & Trim',
	currency: 'USD',
	timeZone: 'America/Chicago',
	units: 'imperial',
	precisionNm: SIXTEENTH,
	kerfNm: length(2 * SIXTEENTH),
	squaringHookNm: length(0),
	squaringFarNm: length(0),
	minPieceNm: inches(24),
	keepOffcutNm: inches(24),
	brakeNm: inches(144),
	shearNm: null,
	handlingNm: null,
	jointPriceCents: 350,
	liftCautionGrams: 22_680
} as const;

export const DEMO_PEOPLE: readonly { name: string; email: string; roles: readonly Role[] }[] = [
	{ name: 'Mira Holt', email: 'mira.holt@tarnbridge.example', roles: ['estimator'] },
	{ name: 'Dov Akana', email: 'dov.akana@tarnbridge.example', roles: ['shop lead'] },
	{ name: 'Ines Varga', email: 'ines.varga@tarnbridge.example', roles: ['purchaser'] },
	{ name: 'Teo Brandt', email: 'teo.brandt@tarnbridge.example', roles: ['installer'] },
	{ name: 'Ruth Okafor', email: 'ruth.okafor@tarnbridge.example', roles: ['owner'] }
];
