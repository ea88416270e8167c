import type { Multistep } from "../method.ts";

/** Predictor with `order - 1` back values, corrector with as many and the new one (predict, evaluate, correct, evaluate). */
export const adamsBashforthMoulton: readonly Multistep[] = [4, 6, 8, 10, 12].map((order) => ({
  id: `adams-bashforth-moulton-${order}`,
  title: `Adams–Bashforth–Moulton ${order}, predict–evaluate–correct–evaluate`,
  order,
  source:
    "F. Bashforth, J.C. Adams (1883); F.R. Moulton, New Methods in Exterior Ballistics (1926); E. Hairer, S.P. Nørsett, G. Wanner, Solving ODEs I, 2nd ed. (1993) sect. III.1",
  backValues: order - 1,
}));
