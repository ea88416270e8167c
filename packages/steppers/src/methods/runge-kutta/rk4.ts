import type { Tableau } from "../method.ts";

export const rk4: Tableau = {
  id: "rk4",
  title: "Classical Runge–Kutta",
  order: 4,
  source: "W. Kutta 1901; E. Hairer, S.P. Nørsett, G. Wanner, Solving ODEs I, 2nd ed. (1993), Table II.1.2",
  a: ["", "1/2", "0 1/2", "0 0 1"],
  b: "1/6 1/3 1/3 1/6",
};
