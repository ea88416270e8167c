import type { EmbeddedTableau } from "../method.ts";

export const verner61978: EmbeddedTableau = {
  id: "verner-6-1978",
  title: "Verner 6 (1978)",
  order: 6,
  source: "J.H. Verner, SIAM J. Numer. Anal. 15 (1978) 772-790; Hairer-Nørsett-Wanner I (1993) Table II.5.4",
  a: [
    "",
    "1/6",
    "4/75 16/75",
    "5/6 -8/3 5/2",
    "-165/64 55/6 -425/64 85/96",
    "12/5 -8 4015/612 -11/36 88/255",
    "-8263/15000 124/75 -643/680 -81/250 2484/10625 0",
    "3501/1720 -300/43 297275/52632 -319/2322 24068/84065 0 3850/26703",
  ],
  b: "3/40 0 875/2244 23/72 264/1955 0 125/11592 43/616",
  embedded: {
    id: "verner-65-1978",
    title: "Verner 6(5) (1978), variable step",
    order: 5,
    b: "13/160 0 2375/5984 5/16 12/85 3/44 0 0",
  },
};
