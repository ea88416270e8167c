/** Raised at the public boundary for an argument outside its documented domain: `where: rule, got value`. */
export class InvalidInputError extends RangeError {
  override readonly name = "InvalidInputError";

  constructor(where: string, rule: string, value: unknown) {
    super(`${where}: ${rule}, got ${String(value)}`);
  }
}

/** A state as the checks below see it. */
interface CheckedMotion {
  readonly position: readonly number[];
  readonly velocity: readonly number[];
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
  dimensions: "must have two or three components in position and velocity alike",
  hyperbola: "must be finite and above 1",
  asymptote: "must lie between the asymptotes (1 + e cos nu above zero)",
  space: "must have three components",
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

/** Throws unless position and velocity are finite and both have two or both three components. */
export function requireMotion(where: string, motion: CheckedMotion): void {
  const { position, velocity } = motion;
  const size = position.length;
  if ((size !== 2 && size !== 3) || velocity.length !== size) {
    throw new InvalidInputError(where, rules.dimensions, `${size} and ${velocity.length}`);
  }
  for (let k = 0; k < size; k++) {
    requireFinite(`${where}.position[${k}]`, position[k]!);
    requireFinite(`${where}.velocity[${k}]`, velocity[k]!);
  }
}

/** Throws with the named rule of this package. */
export function refuse(where: string, rule: keyof typeof rules, value: unknown): never {
  throw new InvalidInputError(where, rules[rule], value);
}
