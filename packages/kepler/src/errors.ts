/** Raised at the public boundary for an argument outside its documented domain: `where: rule, got value`. */
export class InvalidInputError extends RangeError {
  override readonly name = "InvalidInputError";

  constructor(where: string, rule: string, value: unknown) {
    super(`${where}: ${rule}, got ${String(value)}`);
  }
}

/** Rules of the package's messages, in one place. */
const rules = {
  finite: "must be a finite number",
  ellipse: "must be in [0, 1)",
  nonNegative: "must be finite and not negative",
  positive: "must be finite and positive",
  radius: "must be at a distance from the centre that is positive and finite",
  rectilinear: "must have an angular momentum other than zero (rectilinear motion has no conic here)",
  bound: "must be bound (an energy below zero)",
  stepIndex: "must be an integer of magnitude at most 2^34",
  count: "must be an integer that is not negative",
  rows: "must have room for four numbers a row",
  times: "must hold a high and a low word a time",
} as const;

/** Throws unless `value` is finite. */
export function requireFinite(where: string, value: number): void {
  if (!Number.isFinite(value)) throw new InvalidInputError(where, rules.finite, value);
}

/** Throws unless `value` is finite and positive. */
export function requirePositive(where: string, value: number): void {
  if (!(value > 0 && value < Number.POSITIVE_INFINITY))
    throw new InvalidInputError(where, rules.positive, value);
}

/** Throws unless `value` is finite and at least zero. */
export function requireNonNegative(where: string, value: number): void {
  if (!(value >= 0 && value < Number.POSITIVE_INFINITY)) {
    throw new InvalidInputError(where, rules.nonNegative, value);
  }
}

/** Throws unless `value` is the eccentricity of an ellipse. */
export function requireEllipse(where: string, value: number): void {
  if (!(value >= 0 && value < 1)) throw new InvalidInputError(where, rules.ellipse, value);
}

/** Throws with the named rule of this package. */
export function refuse(where: string, rule: keyof typeof rules, value: unknown): never {
  throw new InvalidInputError(where, rules[rule], value);
}
