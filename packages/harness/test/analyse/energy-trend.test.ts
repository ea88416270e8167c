import { describe, expect, it } from "vitest";
import { EnergyBlocks } from "../../src/analyse/energy-trend.ts";

const ORBITS = 1280;
/** Energy errors of an orbit: a mean and the half width about it. */
function judge(mean: (orbit: number) => number, half: number, evaluations = 1e6) {
  const blocks = new EnergyBlocks(ORBITS);
  for (let k = 0; k < ORBITS; k++) blocks.accept(mean(k), mean(k) - half, mean(k) + half);
  return blocks.judge(evaluations);
}

function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
}

describe("energy trend", () => {
  it("bounded: block means stay within twice the spread of an orbit", () => {
    const { energyTrend, atFloor, statistics } = judge((k) => 1e-6 * Math.sin(k / 50), 1e-6);
    expect([energyTrend, atFloor]).toEqual(["bounded", false]);
    expect(statistics).toMatchObject({ blocks: 64, orbitsPerBlock: 20 });
    expect(statistics?.spreadInOrbit).toBeCloseTo(2e-6, 18);
  });

  it("drifting: a steady change beyond the spread", () => {
    const { energyTrend, statistics } = judge((k) => -1e-8 * k + 1e-9 * Math.cos(k), 1e-8);
    expect(energyTrend).toBe("drifting");
    expect(statistics?.driftSignificance).toBeLessThan(-8);
    // Block means are 20 orbits apart, 63 intervals.
    expect(statistics?.rangeOfMeans).toBeCloseTo(1e-8 * 20 * 63, 9);
  });

  it("random walk at the rounding floor", () => {
    const random = seeded(3);
    let energy = 0;
    const walk = Array.from({ length: ORBITS }, () => {
      energy += 1e-15 * (random() - 0.5);
      return energy;
    });
    expect(judge((k) => walk[k] ?? 0, 1e-17)).toMatchObject({ energyTrend: "random-walk", atFloor: true });
  });

  it("drifting where more than half the energy is gone, however unsteadily", () => {
    const random = seeded(5);
    expect(judge((k) => (k < 600 ? 0 : 0.7) + 0.01 * random(), 1e-3).energyTrend).toBe("drifting");
  });

  it("none below 128 orbits or where the run ended early", () => {
    expect(new EnergyBlocks(127).judge(1)).toMatchObject({
      energyTrend: null,
      note: "fewer than 128 orbits",
    });
    const cut = new EnergyBlocks(1280);
    cut.accept(0, 0, 0);
    expect(cut.judge(1)).toMatchObject({ energyTrend: null, note: "the run ended early" });
  });
});
