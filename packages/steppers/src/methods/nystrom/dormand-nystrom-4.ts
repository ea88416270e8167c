import type { EmbeddedNystrom } from "../method.ts";

export const dormandNystrom4: EmbeddedNystrom = {
  id: "dormand-nystrom-4",
  title: "Dormand–El-Mikkawy–Prince Nyström 4",
  order: 4,
  source: "J.R. Dormand, M.E.A. El-Mikkawy, P.J. Prince, IMA J. Numer. Anal. 7 (1987) 235-250",
  c: "0 1/4 7/10 1",
  a: ["", "1/32", "7/1000 119/500", "1/14 8/27 25/189"],
  position: "1/14 8/27 25/189 0",
  velocity: "1/14 32/81 250/567 5/54",
  embedded: {
    id: "dormand-nystrom-43",
    title: "Dormand–El-Mikkawy–Prince Nyström 4(3), variable step",
    order: 3,
    position: "-7/150 67/150 3/20 -1/20",
    velocity: "13/21 -20/27 275/189 -1/3",
  },
};
