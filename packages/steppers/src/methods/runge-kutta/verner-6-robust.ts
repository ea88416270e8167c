import type { EmbeddedTableau } from "../method.ts";

export const verner6Robust: EmbeddedTableau = {
  id: "verner-6-robust",
  title: "Verner 6, robust",
  order: 6,
  source: "J.H. Verner, Numer. Algorithms 53 (2010) 383-396 (and the author's published coefficient files)",
  a: [
    "",
    "9/50",
    "29/324 25/324",
    "1/16 0 3/16",
    "79129/250000 0 -261237/250000 19663/15625",
    "1336883/4909125 0 -25476/30875 194159/185250 8225/78546",
    "-2459386/14727375 0 19504/30875 2377474/13615875 -6157250/5773131 902/735",
    "2699/7410 0 -252/1235 -1393253/3993990 236875/72618 -135/49 15/22",
    "11/144 0 0 256/693 0 125/504 125/528 5/72",
  ],
  b: "11/144 0 0 256/693 0 125/504 125/528 5/72 0",
  embedded: {
    id: "verner-65-robust",
    title: "Verner 6(5), robust, variable step",
    order: 5,
    b: "28/477 0 0 212/441 -312500/366177 2125/1764 0 -2105/35532 2995/17766",
  },
};
