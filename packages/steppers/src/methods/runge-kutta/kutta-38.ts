import type { Tableau } from "../method.ts";

export const kutta38: Tableau = {
  id: "kutta-38",
  title: "Kutta 3/8",
  order: 4,
  source: "W. Kutta, Z. Math. Phys. 46 (1901) 435-453",
  a: ["", "1/3", "-1/3 1", "1 -1 1"],
  b: "1/8 3/8 3/8 1/8",
};
