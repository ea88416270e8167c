import { describe, expect, it } from "vitest";
import { fitOrder, type Rung } from "../../src/analyse/order-window.ts";

const FLOOR = 1e-14;
/** Rungs at 8, 8 sqrt 2, 16, ... steps. */
const ladder = (count: number, error: (n: number) => number | null): Rung[] =>
  Array.from({ length: count }, (_, i) => {
    const fineness = 8 * 2 ** (i / 2);
    return { fineness, error: error(fineness), floor: FLOOR };
  });

describe("fitOrder", () => {
  it("finds a pure power to rounding, over at most a factor of eight in step", () => {
    const { order, window, floor, floorFrom, note } = fitOrder(ladder(12, (n) => 10 * n ** -4));
    expect(order?.value).toBeCloseTo(4, 10);
    expect(order?.standardError).toBeLessThan(1e-10);
    expect((window?.to ?? 0) / (window?.from ?? 1)).toBeCloseTo(8, 6);
    expect([floor, floorFrom, note]).toEqual([null, null, null]);
  });

  it("stays above the rounding floor and reports it", () => {
    const { order, window, floor, floorFrom } = fitOrder(ladder(30, (n) => 10 * n ** -4 + 3e-15));
    // The last rung in the window is at least 20 floors high, so 3e-15 is at most 1.5% of it.
    expect(Math.abs((order?.value ?? 0) - 4)).toBeLessThan(0.02);
    expect(10 * (window?.to ?? 0) ** -4).toBeGreaterThan(20 * FLOOR - 3e-15);
    expect(floor).toBeGreaterThan(2.9e-15);
    expect(floor).toBeLessThan(2e-13);
    expect(floorFrom).toBeGreaterThan(window?.to ?? Number.POSITIVE_INFINITY);
  });

  it("leaves the pre-asymptotic bend out", () => {
    const { order } = fitOrder(ladder(24, (n) => n ** -2 * (1 + 400 * n ** -2)));
    expect(Math.abs((order?.value ?? 0) - 2)).toBeLessThan(0.01);
  });

  it("gives no order where errors scatter or change sign", () => {
    let state = 7;
    const noise = () => {
      state = (state * 16807) % 2147483647;
      return state / 2147483647;
    };
    const scattered = fitOrder(ladder(14, (n) => n ** -3 * 10 ** (2 * noise() - 1)));
    expect(scattered.order).toBeNull();
    expect(scattered.note).toBe("no asymptotic window");
    // Two powers of opposite sign that cancel at the fine end.
    const crossing = fitOrder(ladder(10, (n) => Math.abs(n ** -2 - 150 * n ** -3)));
    expect(crossing.order).toBeNull();
  });

  it("says where all is at the floor, and where no run gave an error", () => {
    expect(fitOrder(ladder(10, () => 2e-14)).note).toBe("at the rounding floor");
    expect(fitOrder(ladder(10, () => null)).note).toBe("no run gave this error");
  });

  it("does not fit rungs coarser than one that failed, nor errors beyond 0.1", () => {
    const { window } = fitOrder(ladder(12, (n) => (n < 30 ? null : 10 * n ** -2)));
    expect(window?.from).toBeGreaterThan(30);
    const large = fitOrder(ladder(8, (n) => 1e4 * n ** -2));
    expect(large.order).toBeNull();
  });
});
