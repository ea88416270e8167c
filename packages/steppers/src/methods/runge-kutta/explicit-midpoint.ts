import type { Tableau } from "../method.ts";

export const explicitMidpoint: Tableau = {
  id: "explicit-midpoint",
  title: "Explicit midpoint",
  order: 2,
  source: "C. Runge, Math. Ann. 46 (1895) 167-178",
  a: ["", "1/2"],
  b: "0 1",
};
