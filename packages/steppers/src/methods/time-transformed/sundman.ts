import type { Sundman } from "../method.ts";
import { dormandPrince5 } from "../runge-kutta/dormand-prince-5.ts";
import { dormandPrince8 } from "../runge-kutta/dormand-prince-8.ts";
import { rk4 } from "../runge-kutta/rk4.ts";

const source = "K.F. Sundman, Acta Math. 36 (1912) 105-179";
const note = "Steps are equal in fictitious time (ds = dt / r), uneven in time.";

export const sundmanRk4: Sundman = {
  id: "sundman-rk4",
  title: "Classical Runge–Kutta, step proportional to r",
  order: 4,
  source: `${source}; ${rk4.source}`,
  note,
  tableau: rk4,
};

export const sundmanDormandPrince5: Sundman = {
  id: "sundman-dormand-prince-5",
  title: "Dormand–Prince 5, step proportional to r",
  order: 5,
  source: `${source}; ${dormandPrince5.source}`,
  note,
  tableau: dormandPrince5,
};

export const sundmanDormandPrince8: Sundman = {
  id: "sundman-dormand-prince-8",
  title: "Dormand–Prince 8, step proportional to r",
  order: 8,
  source: `${source}; ${dormandPrince8.source}`,
  note,
  tableau: dormandPrince8,
};
