import type { StepperInfo } from "@perigauge/steppers";
import type { OrderMeasure } from "./order-measures.ts";

/** The order that theory gives a measure: one number, or a range that a run of finite steps may fall into; null where none can be given. */
export interface ExpectedOrder {
  readonly expectedOrder: number | null;
  readonly expectedRange: readonly [from: number, to: number] | null;
  /** What to know when reading the measured order. */
  readonly explanation: string | null;
}

export interface OrderSetting {
  readonly eccentricity: number;
  readonly orbits: number;
  readonly startAnomalyDeg: number;
}

const graded = (order: number, explanation: string | null = null): ExpectedOrder => ({
  expectedOrder: order,
  expectedRange: [order, order],
  explanation,
});
const between = (from: number, to: number, explanation: string): ExpectedOrder => ({
  expectedOrder: null,
  expectedRange: [from, to],
  explanation,
});
const open = (explanation: string): ExpectedOrder => ({
  expectedOrder: null,
  expectedRange: null,
  explanation,
});

/**
 * Expected order of a measure on an eccentric orbit, p being the method's order.
 *
 * - Symplectic, even p: p in all measures; energy at whole orbits meets the modified energy and shows 2p to 3p, which is not graded
 *   (E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer 2006, ch. IX and XI).
 * - Symplectic, odd p: the term of order p of the modified energy averages out over an orbit that starts at an apsis, so the
 *   time from passage to passage shows p + 1; largest values within an orbit show p.
 * - Others, odd p: p in all but the apsis, which shows p + 1. Even p: the secular energy change is of order p + 1; errors of order
 *   p beside it may be the smaller part, so that orders up to p + 1 are seen over one orbit; the apsis shows p.
 */
export function expectedOrder(
  stepper: StepperInfo,
  measure: OrderMeasure,
  { eccentricity, orbits, startAnomalyDeg }: OrderSetting,
): ExpectedOrder {
  const p = stepper.order;
  if (eccentricity === 0) {
    return measure === "apsis"
      ? open("not defined on a circular orbit")
      : open("not graded on the circular orbit, whose symmetry takes away leading terms");
  }
  if (stepper.family === "own") return open("the order of a stepper of one's own is not known");
  if (stepper.knob === "tolerance") {
    return open("variable step: fitted against accepted steps per orbit, not graded");
  }
  if (stepper.id === "logarithmic-leapfrog") {
    return measure === "energy" || measure === "energyAtWholeOrbits" || measure === "apsis"
      ? open("exact up to rounding: the orbit's path is kept, only the time along it errs")
      : graded(p);
  }
  if (stepper.symplectic) {
    return p % 2 === 0
      ? evenSymplectic(measure, p, stepper.timeReversible)
      : oddSymplectic(measure, p, orbits, startAnomalyDeg);
  }
  return p % 2 === 0 ? evenOther(measure, p, orbits) : oddOther(measure, p);
}

function evenSymplectic(measure: OrderMeasure, p: number, symmetric: boolean): ExpectedOrder {
  if (measure === "energyAtWholeOrbits") {
    return open(
      symmetric
        ? `superconvergent: the modified energy is kept, ${3 * p} from an apsis and ${2 * p} elsewhere where rounding leaves room`
        : "superconvergent: the modified energy is kept and returns with the orbit",
    );
  }
  return graded(p);
}

function oddSymplectic(
  measure: OrderMeasure,
  p: number,
  orbits: number,
  startAnomalyDeg: number,
): ExpectedOrder {
  const fromApsis = startAnomalyDeg % 180 === 0;
  switch (measure) {
    case "energy":
      return graded(p);
    case "energyAtWholeOrbits":
      return open("superconvergent: the modified energy is kept and returns with the orbit");
    case "apsis":
      return graded(p + 1, "the term of order p averages out over an orbit");
    case "period":
      return fromApsis
        ? graded(p + 1, "from an apsis the term of order p averages out over an orbit")
        : graded(p);
    case "timing":
      if (startAnomalyDeg % 360 === 0)
        return graded(p + 1, "from periapsis to periapsis the term of order p averages out");
      return fromApsis
        ? {
            ...between(p, p + 1, "a lead or lag of order p over the first half orbit, then order p + 1"),
            expectedOrder: p,
          }
        : graded(p);
    default:
      if (!fromApsis) return graded(p);
      return {
        ...between(
          p,
          p + 1,
          "an oscillation of order p beside a drift of order p + 1, which may be the larger",
        ),
        expectedOrder: orbits <= 1 ? p : null,
      };
  }
}

function oddOther(measure: OrderMeasure, p: number): ExpectedOrder {
  return measure === "apsis" ? graded(p + 1, "the apsis turns by the next order") : graded(p);
}

function evenOther(measure: OrderMeasure, p: number, orbits: number): ExpectedOrder {
  switch (measure) {
    case "energyAtWholeOrbits":
      return graded(p + 1, "the secular energy change is one order higher than the error within an orbit");
    case "apsis":
      return graded(p);
    case "energy":
      return between(p, p + 1, "an oscillation of order p beside a secular change of order p + 1");
    default:
      return orbits <= 1
        ? {
            ...between(
              p,
              p + 1,
              "an error of order p beside what the secular energy change of order p + 1 brings",
            ),
            expectedOrder: p,
          }
        : open(
            "errors of order p and p + 1 grow at different rates, so the order seen depends on the length of the run",
          );
  }
}
