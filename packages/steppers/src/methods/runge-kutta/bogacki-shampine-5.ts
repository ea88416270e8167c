import type { EmbeddedTableau } from "../method.ts";

export const bogackiShampine5: EmbeddedTableau = {
  id: "bogacki-shampine-5",
  title: "Bogacki–Shampine 5",
  order: 5,
  source: "P. Bogacki, L.F. Shampine, Comput. Math. Appl. 32(6) (1996) 15-28",
  a: [
    "",
    "1/6",
    "2/27 4/27",
    "183/1372 -162/343 1053/1372",
    "68/297 -4/11 42/143 1960/3861",
    "597/22528 81/352 63099/585728 58653/366080 4617/20480",
    "174197/959244 -30942/79937 8152137/19744439 666106/1039181 -29421/29068 482048/414219",
    "587/8064 0 4440339/15491840 24353/124800 387/44800 2152/5985 7267/94080",
  ],
  b: "587/8064 0 4440339/15491840 24353/124800 387/44800 2152/5985 7267/94080 0",
  embedded: {
    id: "bogacki-shampine-54",
    title: "Bogacki–Shampine 5(4), variable step",
    order: 4,
    b: "6059/80640 0 8559189/30983680 26411/124800 -927/89600 443/1197 7267/94080 0",
  },
};
