import type { NystromTableau } from "../method.ts";

export const nystrom4: NystromTableau = {
  id: "nystrom-4",
  title: "Nyström 4",
  order: 4,
  source: "E.J. Nyström, Acta Soc. Sci. Fenn. 50(13) (1925) 1-55; Hairer-Nørsett-Wanner I (1993) sect. II.14",
  c: "0 1/2 1",
  a: ["", "1/8", "0 1/2"],
  position: "1/6 1/3 0",
  velocity: "1/6 2/3 1/6",
};

export const nystrom5: NystromTableau = {
  id: "nystrom-5",
  title: "Nyström 5",
  order: 5,
  source: "E.J. Nyström, Acta Soc. Sci. Fenn. 50(13) (1925) 1-55; Hairer-Nørsett-Wanner I (1993) sect. II.14",
  c: "0 1/5 2/3 1",
  a: ["", "1/50", "-1/27 7/27", "3/10 -2/35 9/35"],
  position: "1/24 25/84 9/56 0",
  velocity: "1/24 125/336 27/56 5/48",
};
