import { afterAll, describe, expect, it } from "vitest";
import { type OrderStudy, observeOrders } from "../../src/analyse/observed-orders.ts";
import { CellPool } from "../../src/run/cell-pool.ts";
import { stepper } from "../support.ts";

const pool = new CellPool({ workers: 1 });
afterAll(() => pool.close());

function study(ids: readonly string[], fields: Partial<OrderStudy> = {}): OrderStudy {
  return {
    steppers: ids.map(stepper),
    eccentricities: [0.3],
    stepsPerOrbit: null,
    tolerances: null,
    orbits: 1,
    startAnomalyDeg: 0,
    summation: "plain",
    ...fields,
  };
}

/*
 * Orders that theory gives (E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer 2006, ch. IX and XI; E. Hairer,
 * S.P. Norsett, G. Wanner, Solving Ordinary Differential Equations I, 2nd ed., Springer 1993, ch. II) against orders measured by the
 * automatic ladder, on every measure that can be graded.
 */
describe("observed orders at e = 0.3 over one orbit", () => {
  it.each([
    "heun-3",
    "rk4",
    "cash-karp-5",
    "nystrom-5",
    "verner-6-1978",
    "bulirsch-stoer-8",
    "hermite-4",
    "adams-bashforth-moulton-4",
    "ruth-3",
    "suzuki-4",
    "calvo-sanz-serna-4",
    "yoshida-6",
    "suzuki-umeno-8",
    "gauss-legendre-4",
    "gauss-legendre-8",
    "sundman-rk4",
  ])("%s: every measure shows the expected order", async (id) => {
    const { result } = await observeOrders(study([id]), pool);
    for (const entry of result.orders) {
      const what = `${id} ${entry.measure}: ${entry.order} +- ${entry.standardError}, ${entry.note}`;
      expect(entry.agrees, what).not.toBe(false);
      if (entry.expectedOrder !== null) {
        expect(entry.order, what).not.toBeNull();
        expect(entry.pointsFitted).toBeGreaterThanOrEqual(5);
        expect(entry.standardError).toBeLessThanOrEqual(0.1);
      }
      if (entry.floorFrom !== null && entry.window !== null)
        expect(entry.window.to).toBeLessThan(entry.floorFrom);
    }
  });

  it("symplectic Euler: order 1 within an orbit, 2 at passages from an apsis, 1 from elsewhere", async () => {
    const ladder = [8, 9, 10, 11, 12, 13].map((k) => 2 ** k);
    const order = async (startAnomalyDeg: number, measure: string) => {
      const { result } = await observeOrders(
        study(["symplectic-euler"], { stepsPerOrbit: ladder, startAnomalyDeg }),
        pool,
      );
      const found = result.orders.find((entry) => entry.measure === measure);
      expect(found?.agrees, `${measure} ${found?.order}`).toBe(true);
      return found?.order as number;
    };
    expect(Math.round(await order(0, "energy"))).toBe(1);
    expect(Math.round(await order(0, "timing"))).toBe(2);
    expect(Math.round(await order(180, "period"))).toBe(2);
    expect(Math.round(await order(180, "timing"))).toBe(1);
    expect(Math.round(await order(60, "timing"))).toBe(1);
  });

  it("logarithmic leapfrog: order 2 in time, path at the floor at every step", async () => {
    const ladder = [16, 32, 64, 128, 256, 512];
    const { result } = await observeOrders(study(["logarithmic-leapfrog"], { stepsPerOrbit: ladder }), pool);
    for (const entry of result.orders) {
      if (["energy", "energyAtWholeOrbits", "apsis"].includes(entry.measure)) {
        expect(entry).toMatchObject({ order: null, note: "at the rounding floor", floorFrom: 16 });
      } else expect(Math.abs((entry.order as number) - 2)).toBeLessThan(0.05);
    }
  });

  it("superconvergence of energy at whole orbits is shown and not graded: 6 for leapfrog from an apsis", async () => {
    const ladder = [64, 91, 128, 181, 256, 362];
    const { result } = await observeOrders(study(["leapfrog"], { stepsPerOrbit: ladder }), pool);
    const whole = result.orders.find(({ measure }) => measure === "energyAtWholeOrbits");
    expect(whole).toMatchObject({ expectedOrder: null, agrees: null });
    expect(whole?.explanation).toContain("superconvergent");
    expect(Math.abs((whole?.order as number) - 6)).toBeLessThan(0.15);
  });

  it("variable step: fitted against accepted steps, not graded; near the order of the pair", async () => {
    const { result } = await observeOrders(study(["dormand-prince-54"]), pool);
    const position = result.orders.find(({ measure }) => measure === "position");
    expect(position).toMatchObject({ expectedOrder: null, agrees: null });
    // Local extrapolation: the formula of order 5 advances.
    expect(Math.abs((position?.order as number) - 5)).toBeLessThan(0.3);
    expect(position?.points[0]).toMatchObject({ stepsPerOrbit: null });
  });

  it("steps that do not divide the orbit: nothing is said of whole orbits", async () => {
    const { result } = await observeOrders(
      study(["suzuki-4"], { stepsPerOrbit: [64.5, 91.5, 128.5, 181.5, 256.5] }),
      pool,
    );
    const order = (measure: string) => result.orders.find((entry) => entry.measure === measure)?.order;
    expect([order("energyAtWholeOrbits"), order("apsis")]).toEqual([null, null]);
    expect(Math.abs((order("timing") ?? 0) - 4)).toBeLessThan(0.05);
  });

  it("circular orbit: no apsis, nothing graded", async () => {
    const { result } = await observeOrders(
      study(["rk4"], { eccentricities: [0], stepsPerOrbit: [16, 23, 32, 45, 64, 91] }),
      pool,
    );
    expect(result.orders.find(({ measure }) => measure === "apsis")).toMatchObject({
      order: null,
      expectedOrder: null,
    });
    expect(result.orders.every(({ expectedOrder }) => expectedOrder === null)).toBe(true);
  });
});
