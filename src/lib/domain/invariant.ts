/** A broken invariant is a defect of the program, never of what a person typed. */
export class InvariantError extends Error {
	override readonly name = 'InvariantError';
}

/** @throws InvariantError when the condition does not hold. */
export function invariant(condition: unknown, message: string): asserts condition {
	if (!condition) throw new InvariantError(message);
}
