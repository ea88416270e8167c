import { InvalidInputError, mustBe } from "../errors.ts";
import type { NumberOrRange, ScenarioOrbit } from "./scenario.ts";

/** Size and shape of one orbit; kilometres. */
export interface OrbitShape {
  readonly semiMajorAxisKm: number;
  readonly eccentricity: number;
}

/**
 * An orbit of the scenario as a function of its free parameters, each in [0, 1]: none where both quantities are numbers, one or two
 * where they are ranges.
 */
export interface OrbitSampler {
  readonly parameters: 0 | 1 | 2;
  at(first: number, second: number): OrbitShape;
}

const QUANTITIES = [
  "semiMajorAxisKm",
  "eccentricity",
  "periapsisRadiusKm",
  "apoapsisRadiusKm",
  "periapsisAltitudeKm",
  "apoapsisAltitudeKm",
] as const;
type Quantity = (typeof QUANTITIES)[number];
type Kind = "axis" | "eccentricity" | "periapsis" | "apoapsis";

const KIND: Readonly<Record<Quantity, Kind>> = {
  semiMajorAxisKm: "axis",
  eccentricity: "eccentricity",
  periapsisRadiusKm: "periapsis",
  apoapsisRadiusKm: "apoapsis",
  periapsisAltitudeKm: "periapsis",
  apoapsisAltitudeKm: "apoapsis",
};

/**
 * @throws InvalidInputError unless exactly two different quantities are given, altitudes have a body radius, and every corner of the
 * ranges is an ellipse above the surface
 */
export function orbitSampler(
  orbit: ScenarioOrbit,
  where: string,
  bodyRadiusKm: number | undefined,
): OrbitSampler {
  const given = QUANTITIES.filter((quantity) => orbit[quantity] !== undefined);
  const [one, two] = given;
  if (given.length !== 2 || one === undefined || two === undefined || KIND[one] === KIND[two]) {
    throw new InvalidInputError(
      `${where}: must be given by two of semi-major axis, eccentricity, periapsis and apoapsis, got ${given.join(", ") || "none"}`,
    );
  }
  for (const quantity of [one, two]) {
    if (quantity.endsWith("AltitudeKm") && bodyRadiusKm === undefined) {
      throw new InvalidInputError(`${where}.${quantity}: needs scenario.bodyRadiusKm`);
    }
    const value = orbit[quantity] as NumberOrRange;
    if (typeof value === "object" && !(value.from < value.to)) {
      throw mustBe(`${where}.${quantity}.to`, `greater than from (${value.from})`, value.to);
    }
  }
  const values = [one, two].map((quantity) => orbit[quantity] as NumberOrRange);
  const free = [one, two].filter((_, i) => typeof values[i] === "object");
  const quantityAt = (quantity: Quantity, fraction: number): number => {
    const value = orbit[quantity] as NumberOrRange;
    const number = typeof value === "number" ? value : value.from + (value.to - value.from) * fraction;
    return quantity.endsWith("AltitudeKm") ? number + (bodyRadiusKm as number) : number;
  };
  const at = (first: number, second: number): OrbitShape => {
    const fraction = (quantity: Quantity): number => (quantity === free[0] ? first : second);
    return shapeFrom(KIND[one], quantityAt(one, fraction(one)), KIND[two], quantityAt(two, fraction(two)));
  };
  for (const first of [0, 1]) for (const second of [0, 1]) checkShape(at(first, second), where, bodyRadiusKm);
  return { parameters: free.length as 0 | 1 | 2, at };
}

function shapeFrom(kind1: Kind, value1: number, kind2: Kind, value2: number): OrbitShape {
  const values: Partial<Record<Kind, number>> = { [kind1]: value1, [kind2]: value2 };
  const { axis, eccentricity, periapsis, apoapsis } = values;
  if (axis !== undefined) {
    if (eccentricity !== undefined) return { semiMajorAxisKm: axis, eccentricity };
    if (periapsis !== undefined) return { semiMajorAxisKm: axis, eccentricity: (axis - periapsis) / axis };
    return { semiMajorAxisKm: axis, eccentricity: ((apoapsis as number) - axis) / axis };
  }
  if (eccentricity !== undefined) {
    const semiMajorAxisKm =
      periapsis !== undefined ? periapsis / (1 - eccentricity) : (apoapsis as number) / (1 + eccentricity);
    return { semiMajorAxisKm, eccentricity };
  }
  const near = periapsis as number;
  const far = apoapsis as number;
  return { semiMajorAxisKm: (near + far) / 2, eccentricity: (far - near) / (far + near) };
}

function checkShape(
  { semiMajorAxisKm, eccentricity }: OrbitShape,
  where: string,
  bodyRadiusKm: number | undefined,
): void {
  if (!(eccentricity >= 0)) {
    throw mustBe(
      `${where}: its apoapsis`,
      "no nearer than its periapsis (eccentricity in [0, 1))",
      eccentricity,
    );
  }
  if (!(eccentricity < 1)) throw mustBe(`${where}: its eccentricity`, "in [0, 1)", eccentricity);
  const periapsis = semiMajorAxisKm * (1 - eccentricity);
  if (!(periapsis > (bodyRadiusKm ?? 0))) {
    throw mustBe(
      `${where}: its periapsis radius, km`,
      `above the surface (${bodyRadiusKm ?? 0} km)`,
      periapsis,
    );
  }
}
