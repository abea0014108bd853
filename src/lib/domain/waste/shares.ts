import { add, type Length } from '../lengths/length';
import type { Ledger } from './ledger';

/** An exact share: both lengths in nanometres, the second always printed as what the share is of. */
export interface Share {
	readonly part: Length;
	readonly of: Length;
}

const bought = ({ newMetal, rackMetal }: Ledger): Length => add(newMetal, rackMetal);

/** Returns (kerf and squaring + scrap + remade) over (new + rack): laps, ends and plates are not waste. */
export const wasteShare = (ledger: Ledger): Share => ({
	part: add(ledger.kerfAndSquaring, ledger.scrap, ledger.remade),
	of: bought(ledger)
});

/** Returns face covered over (new + rack): net over bought. */
export const netShare = (ledger: Ledger): Share => ({ part: ledger.face, of: bought(ledger) });

/** Returns a share in hundredths of a percent, rounded half up; 0 when nothing was bought. */
export const inBasisPoints = ({ part, of }: Share): number =>
	of === 0 ? 0 : Number((BigInt(part) * 20_000n + BigInt(of)) / (2n * BigInt(of)));
