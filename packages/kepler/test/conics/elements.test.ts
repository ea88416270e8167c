import { elementsFromState, InvalidInputError, stateFromElements } from "@perigauge/kepler";
import fc from "fast-check";
import { describe, expect, test } from "vitest";

const degree = Math.PI / 180;

function near(actual: number, printed: number, half: number): void {
  expect(Math.abs(actual - printed)).toBeLessThanOrEqual(half);
}

// Printed values are recalled, or quoted at second hand, from the sources named; each was recomputed at 40 digits from its inputs.
describe("published examples", () => {
  test("Vallado, example 2-5 (p and a printed from rounded intermediates: relative 1e-6)", () => {
    const own = elementsFromState(
      { position: [6524.834, 6862.875, 6448.296], velocity: [4.901327, 5.533756, -1.976341] },
      398600.4418,
    );
    near(own.semiLatusRectum / 11067.79, 1, 1e-6);
    near(own.semiMajorAxis / 36127.343, 1, 1e-6);
    near(own.eccentricity, 0.832853, 0.6e-6);
    near(own.inclination / degree, 87.87, 1e-3);
    near(own.ascendingNode / degree, 227.898, 0.6e-3);
    near(own.argumentOfPeriapsis / degree, 53.38, 0.6e-2);
    near(own.trueAnomaly / degree, 92.335, 0.6e-3);
    near(own.energy, -5.516604, 0.6e-6);
    near(own.angularMomentum, 66420.1, 0.06);
    // Computed at 40 digits from the printed inputs; a rounded input is worth a few 1e-16 of each.
    near(own.semiLatusRectum / 11067.79834266182, 1, 2e-15);
    near(own.semiMajorAxis / 36127.33761967865, 1, 4e-15);
    near(own.eccentricity, 0.8328533984875213, 1e-15);
    near(own.inclination / degree, 87.86912617702644, 1e-13);
    near(own.ascendingNode / degree, 227.8982603572737, 1e-12);
    near(own.argumentOfPeriapsis / degree, 53.38493061845977, 1e-12);
    near(own.trueAnomaly / degree, 92.33515676213736, 1e-12);
  });

  test("Curtis, example 4.3", () => {
    const own = elementsFromState(
      { position: [-6045, -3490, 2500], velocity: [-3.457, 6.618, 2.533] },
      398600,
    );
    near(own.angularMomentum, 58310, 5);
    near(own.inclination / degree, 153.2, 0.06);
    near(own.ascendingNode / degree, 255.3, 0.06);
    near(own.eccentricity, 0.1712, 0.6e-4);
    near(own.argumentOfPeriapsis / degree, 20.07, 0.6e-2);
    near(own.trueAnomaly / degree, 28.45, 0.6e-2);
    near(own.semiMajorAxis, 8788, 0.6);
    // Computed at 40 digits.
    near(own.angularMomentum, 58311.66993185605, 1e-10);
    near(own.inclination / degree, 153.2492285182475, 1e-12);
    near(own.argumentOfPeriapsis / degree, 20.0683166505825, 1e-12);
    near(own.eccentricity, 0.1712123462844536, 1e-15);
  });

  test("Curtis, example 4.7: a hyperbola", () => {
    const state = stateFromElements(
      {
        semiLatusRectum: 80000 ** 2 / 398600,
        eccentricity: 1.4,
        inclination: 30 * degree,
        ascendingNode: 40 * degree,
        argumentOfPeriapsis: 60 * degree,
        trueAnomaly: 30 * degree,
      },
      398600,
    );
    const printed = [-4040, 4815, 3629, -10.39, -4.772, 1.744];
    const half = [0.6, 0.6, 0.6, 0.6e-2, 0.6e-3, 0.6e-3];
    [...state.position, ...state.velocity].forEach((value, k) => {
      near(value, printed[k]!, half[k]!);
    });
    // Computed at 40 digits.
    const exact = [
      -4039.89592320174, 4814.560480182376, 3628.624702171884, -10.38598761819468, -4.771921637340856,
      1.743875,
    ];
    [...state.position, ...state.velocity].forEach((value, k) => {
      near(value / exact[k]!, 1, 2e-14);
    });
  });

  test("Bate, Mueller & White 1971, section 2.6, canonical units", () => {
    const state = stateFromElements({
      semiLatusRectum: 2.25,
      eccentricity: 0.5,
      inclination: Math.PI / 4,
      ascendingNode: Math.PI / 6,
      argumentOfPeriapsis: 0,
      trueAnomaly: 0,
    });
    const root = Math.sqrt(2);
    const exact = [(3 * Math.sqrt(3)) / 4, 3 / 4, 0, -1 / (2 * root), Math.sqrt(3) / (2 * root), 1 / root];
    [...state.position, ...state.velocity].forEach((value, k) => {
      near(value, exact[k]!, 4e-16);
    });
    const own = elementsFromState(state);
    near(own.semiMajorAxis, 3, 4e-15);
    near(own.eccentricity, 0.5, 1e-15);
  });
});

describe("defined values", () => {
  test("circular and equatorial: longitude as true anomaly", () => {
    const own = elementsFromState({ position: [0, 1, 0], velocity: [-1, 0, 0] });
    expect(own).toMatchObject({ inclination: 0, ascendingNode: 0, argumentOfPeriapsis: 0, eccentricity: 0 });
    near(own.trueAnomaly, Math.PI / 2, 1e-16);
  });

  test("circular and inclined: argument of latitude as true anomaly", () => {
    const half = Math.SQRT1_2;
    const own = elementsFromState({ position: [0, half, half], velocity: [-1, 0, 0] });
    expect(own.argumentOfPeriapsis).toBe(0);
    near(own.inclination, Math.PI / 4, 2e-16);
    near(own.trueAnomaly, Math.PI / 2, 2e-16);
  });

  test("equatorial, elliptic, prograde and retrograde: argument from the x axis in the sense of the motion", () => {
    const forward = elementsFromState({ position: [0, 0.5, 0], velocity: [-Math.sqrt(3), 0, 0] });
    expect(forward).toMatchObject({ inclination: 0, ascendingNode: 0 });
    near(forward.argumentOfPeriapsis, Math.PI / 2, 2e-16);
    const backward = elementsFromState({ position: [0, 0.5, 0], velocity: [Math.sqrt(3), 0, 0] });
    near(backward.inclination, Math.PI, 0);
    near(backward.argumentOfPeriapsis, (3 * Math.PI) / 2, 8e-16);
  });

  test("a parabola has an infinite semi-major axis", () => {
    // 3-4-5: r = 2, v = (0, 1, 0)... v^2 = 2/r exactly.
    const own = elementsFromState({ position: [2, 0, 0], velocity: [0, 1, 0] });
    expect(own).toMatchObject({
      semiMajorAxis: Number.POSITIVE_INFINITY,
      eccentricity: 1,
      semiLatusRectum: 4,
    });
  });
});

describe("round trip", () => {
  const turn = fc.double({ min: 0.01, max: 6.27, noNaN: true });
  test("elements to state and back, every conic", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 5, noNaN: true }),
        fc.double({ min: 0.01, max: 3.13, noNaN: true }),
        turn,
        turn,
        fc.double({ min: -1, max: 1, noNaN: true }),
        (eccentricity, inclination, ascendingNode, argumentOfPeriapsis, share) => {
          // Within 0.9 of the asymptote for an open conic, anywhere for a closed one.
          const widest = eccentricity < 1 ? Math.PI : 0.9 * Math.acos(-1 / eccentricity);
          const trueAnomaly = share * widest;
          const elements = {
            semiLatusRectum: 1.7,
            eccentricity,
            inclination,
            ascendingNode,
            argumentOfPeriapsis,
            trueAnomaly,
          };
          const own = elementsFromState(stateFromElements(elements));
          // A state rounded by 2^-53 moves e by 4 units of v^2 r, and angles by that over e and over sin i.
          const size = 1 + eccentricity;
          const bound =
            (2 ** -50 * size * size) /
            Math.min(1, eccentricity * Math.sin(inclination)) /
            Math.min(1, Math.abs(1 + eccentricity * Math.cos(trueAnomaly)));
          const angle = (a: number, b: number): number => Math.abs(Math.sin((a - b) / 2)) * 2;
          near(own.semiLatusRectum, 1.7, 4 * bound);
          near(own.eccentricity, eccentricity, 4 * bound);
          near(own.inclination, inclination, bound);
          expect(angle(own.ascendingNode, ascendingNode)).toBeLessThanOrEqual(bound);
          expect(angle(own.argumentOfPeriapsis, argumentOfPeriapsis)).toBeLessThanOrEqual(4 * bound);
          expect(angle(own.trueAnomaly, trueAnomaly)).toBeLessThanOrEqual(4 * bound);
        },
      ),
      { seed: 51, numRuns: 300 },
    );
  });
});

describe("bad input", () => {
  const good = {
    semiLatusRectum: 1,
    eccentricity: 2,
    inclination: 0,
    ascendingNode: 0,
    argumentOfPeriapsis: 0,
    trueAnomaly: 0,
  };
  test("named arguments", () => {
    expect(() => stateFromElements({ ...good, trueAnomaly: 3 })).toThrow(
      "stateFromElements.trueAnomaly: must lie between the asymptotes",
    );
    expect(() => stateFromElements({ ...good, eccentricity: -1 })).toThrow(
      "stateFromElements.eccentricity: must be finite and not negative, got -1",
    );
    expect(() => stateFromElements({ ...good, semiLatusRectum: 0 })).toThrow(
      "stateFromElements.semiLatusRectum: must be finite and positive, got 0",
    );
    expect(() => elementsFromState({ position: [1, 0], velocity: [0, 1] })).toThrow(
      "elementsFromState.state: must have three components, got 2",
    );
    expect(() => elementsFromState({ position: [1, 0, 0], velocity: [1, 0, 0] })).toThrow(InvalidInputError);
    expect(() => elementsFromState({ position: [0, 0, 0], velocity: [1, 0, 0] })).toThrow(
      "elementsFromState.state.position",
    );
  });
});
