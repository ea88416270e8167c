import type { EmbeddedTableau } from "../method.ts";

export const cashKarp5: EmbeddedTableau = {
  id: "cash-karp-5",
  title: "Cash–Karp 5",
  order: 5,
  source: "J.R. Cash, A.H. Karp, ACM Trans. Math. Softw. 16 (1990) 201-222",
  a: [
    "",
    "1/5",
    "3/40 9/40",
    "3/10 -9/10 6/5",
    "-11/54 5/2 -70/27 35/27",
    "1631/55296 175/512 575/13824 44275/110592 253/4096",
  ],
  b: "37/378 0 250/621 125/594 0 512/1771",
  embedded: {
    id: "cash-karp-54",
    title: "Cash–Karp 5(4), variable step",
    order: 4,
    b: "2825/27648 0 18575/48384 13525/55296 277/14336 1/4",
  },
};
