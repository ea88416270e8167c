import { describe, expect, it } from "vitest";
import { energy, periapsis, stateAfter } from "./support/runs.ts";

/**
 * e = 0.6 from periapsis, h = 1/32, 200 steps: the schemes in exact arithmetic (computed at 40 digits; decimals shortened to a double's).
 * x, y, energy error, and how far a plain run in doubles was seen from it: operations ordered otherwise may differ as much again, five
 * times are allowed, and half a unit of the twelve digits of the energy error.
 */
const ends: readonly (readonly [string, number, number, number, number])[] = [
  ["explicit-euler", -3.791822553715712, 0.31489865495563396, 0.310183677407, 2.56e-15],
  ["symplectic-euler-dk", 0.27460262275794, -0.3526904024003251, 0.0516713612288, 3.43e-14],
  ["leapfrog", 0.3932909054546531, -0.09113935307453219, -3.36847606837e-5, 2.87e-13],
  ["heun-2", 0.2625170341238422, -0.40052369737200333, 0.00683304368441, 2.09e-14],
  ["rk4", 0.3965911029059182, -0.06600425766184284, -3.08217310641e-6, 8.36e-14],
  ["bogacki-shampine-3", 0.3970876578959668, -0.06187700814788256, -0.00018863396968, 1.42e-13],
  ["verner-6-robust", 0.3965722758425452, -0.06618132029499385, 6.7366959563e-10, 2.89e-14],
  ["dormand-prince-8", 0.3965722768580094, -0.06618131215978762, -1.13471245027e-12, 5.02e-14],
  ["dormand-nystrom-4", 0.3965720315943532, -0.06618545195266361, -3.88189371847e-7, 8.13e-14],
  ["dormand-nystrom-12", 0.39657227686339663, -0.06618131210451723, 8.59177254641e-21, 7.96e-14],
  ["forest-ruth-4", 0.39649217900115447, -0.06692163243559836, 6.21570043794e-7, 1.33e-14],
  ["mclachlan-atela-4", 0.3965713628042095, -0.06618921954214141, -3.86537194085e-8, 4.1e-14],
  ["blanes-moan-nystrom-4", 0.3965722991092799, -0.06618109708943806, -7.09547994604e-10, 9.79e-14],
  ["yoshida-6-kdk", 0.3965717580751899, -0.06618609528165056, 8.52613378562e-9, 1.73e-13],
  ["bulirsch-stoer-10", 0.3965722768634092, -0.06618131210439326, -1.24576309798e-15, 1.9e-13],
  ["kahan-li-6", 0.39657227608239526, -0.0661813176087697, -1.19313599509e-10, 6.99e-14],
];

describe("end states of the schemes", () => {
  it.each(ends)("%s", (id, x, y, energyError, rounding) => {
    const end = stateAfter(id, 200, { state: periapsis(0.6), step: 1 / 32 });
    expect(Math.abs(end[0]! - x)).toBeLessThan(5 * rounding);
    expect(Math.abs(end[1]! - y)).toBeLessThan(5 * rounding);
    expect(Math.abs(energy(end) + 0.5 - energyError)).toBeLessThan(
      5 * rounding + 5e-12 * Math.abs(energyError),
    );
  });
});
