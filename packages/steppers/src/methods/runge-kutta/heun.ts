import type { Tableau } from "../method.ts";

export const heun2: Tableau = {
  id: "heun-2",
  title: "Heun 2",
  order: 2,
  source: "C. Runge, Math. Ann. 46 (1895) 167-178; K. Heun, Z. Math. Phys. 45 (1900) 23-38",
  a: ["", "1"],
  b: "1/2 1/2",
};

export const heun3: Tableau = {
  id: "heun-3",
  title: "Heun 3",
  order: 3,
  source: "K. Heun, Z. Math. Phys. 45 (1900) 23-38",
  a: ["", "1/3", "0 2/3"],
  b: "1/4 0 3/4",
};
