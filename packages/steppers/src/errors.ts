/** Wrong use of this package: the message is one line, `where: rule, got value`. */
export class InvalidInputError extends RangeError {
  override readonly name = "InvalidInputError";
}

function rule(where: string, text: string, got: unknown): InvalidInputError {
  return new InvalidInputError(`${where}: ${text}, got ${String(got)}`);
}

/** Every message of this package. */
export const invalid = {
  stateLength: (got: number): InvalidInputError =>
    rule("start.state", "must hold 4 numbers (plane) or 6 (space)", got),
  step: (got: number): InvalidInputError => rule("start.step", "must be finite and not zero", got),
  tolerance: (got: unknown): InvalidInputError => rule("start.tolerance", "must be in (0, 1)", got),
  endTime: (got: unknown): InvalidInputError => rule("start.endTime", "must be finite and positive", got),
  maxStep: (got: unknown): InvalidInputError => rule("start.maxStep", "must be positive", got),
  jerk: (id: string): InvalidInputError =>
    rule("start.jerk", `must be given with an acceleration for ${id}`, "none"),
  summation: (got: string): InvalidInputError =>
    rule("start.summation", "must be plain for this stepper", got),
  maxSteps: (got: number): InvalidInputError =>
    rule("advance.maxSteps", "must be a whole number, zero or more", got),
  rowsLength: (needed: number, got: number): InvalidInputError =>
    rule("advance.rows", `must hold at least ${needed} numbers`, got),
  timesLength: (needed: number, got: unknown): InvalidInputError =>
    rule("advance.times", `must hold at least ${needed} numbers where steps are uneven`, got),
  interpolationTime: (got: number): InvalidInputError =>
    rule("interpolate.time", "must lie inside the last step made", got),
  ownId: (got: unknown): InvalidInputError => rule("own.id", "must be a non-empty string", got),
  ownStep: (got: unknown): InvalidInputError => rule("own.step", "must be a function", got),
  coefficient: (got: string): InvalidInputError =>
    rule("coefficient", "must be p/q or a decimal number", got),
  division: (got: string): InvalidInputError => rule("rational", "must not be divided by zero", got),
} as const;
