/**
 * Sealant by bead and lap. Volume: 1 US fl oz is 1.8046875 in³ (231/128, exact), so a 10.1 oz cartridge
 * holds 18.23 in³. Cartridges are rounded up per colour, never per elevation.
 */
import { INCH, type Length } from '../lengths/length';

export type Bead =
	| { readonly shape: 'round'; readonly diameter: Length }
	| { readonly shape: 'rectangular'; readonly width: Length; readonly depth: Length };

const CUBIC_INCHES_PER_OUNCE = 231 / 128;
const inInches = (of: Length): number => of / INCH;

/** Cross-section in square inches. */
const section = (bead: Bead): number =>
	bead.shape === 'round'
		? (Math.PI / 4) * inInches(bead.diameter) ** 2
		: inInches(bead.width) * inInches(bead.depth);

/** Returns the feet of bead that one cartridge of so many US fluid ounces lays. */
export const feetPerCartridge = (bead: Bead, ounces: number): number =>
	(ounces * CUBIC_INCHES_PER_OUNCE) / (12 * section(bead));

export interface LapSealant {
	readonly laps: number;
	readonly beads: number;
	/** Every bead runs across the girth. */
	readonly girth: Length;
}

/** Returns the bead length of laps, in nanometres: laps × beads × girth. */
export const lapBeadLength = ({ laps, beads, girth }: LapSealant): number => laps * beads * girth;

export interface CartridgeRule {
	readonly bead: Bead;
	readonly ounces: number;
	/** Added for what is lost, whole percent; 10 is usual. */
	readonly wastePercent: number;
}

/** Returns whole cartridges of one colour for a bead length in nanometres; none for no bead. */
export function cartridgesFor(beadLength: number, rule: CartridgeRule): number {
	const feet = (beadLength / INCH / 12) * (1 + rule.wastePercent / 100);
	// A hair of floating dust must not cost a cartridge: a ten-thousandth of one is below any nozzle's rest.
	return Math.max(0, Math.ceil(feet / feetPerCartridge(rule.bead, rule.ounces) - 1e-4));
}
