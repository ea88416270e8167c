import type { Tableau } from "../method.ts";

export const ralston2: Tableau = {
  id: "ralston-2",
  title: "Ralston 2",
  order: 2,
  source: "A. Ralston, Math. Comp. 16 (1962) 431-437",
  a: ["", "2/3"],
  b: "1/4 3/4",
};
