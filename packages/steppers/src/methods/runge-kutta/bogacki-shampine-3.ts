import type { EmbeddedTableau } from "../method.ts";

export const bogackiShampine3: EmbeddedTableau = {
  id: "bogacki-shampine-3",
  title: "Bogacki–Shampine 3",
  order: 3,
  source: "P. Bogacki, L.F. Shampine, Appl. Math. Lett. 2(4) (1989) 321-325",
  a: ["", "1/2", "0 3/4", "2/9 1/3 4/9"],
  b: "2/9 1/3 4/9 0",
  embedded: {
    id: "bogacki-shampine-32",
    title: "Bogacki–Shampine 3(2), variable step",
    order: 2,
    b: "7/24 1/4 1/3 1/8",
  },
  dense: {
    order: 3,
    rows: ["1 -4/3 5/9", "0 1 -2/3", "0 4/3 -8/9", "0 -1 1"],
  },
};
