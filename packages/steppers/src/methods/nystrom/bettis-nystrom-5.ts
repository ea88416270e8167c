import type { EmbeddedNystrom } from "../method.ts";

export const bettisNystrom5: EmbeddedNystrom = {
  id: "bettis-nystrom-5",
  title: "Bettis Nyström 5",
  order: 5,
  source: "D.G. Bettis, Celest. Mech. 8 (1973) 229-233",
  c: "0 1/8 1/4 1/2 3/4 1",
  a: ["", "1/128", "1/96 1/48", "1/24 0 1/12", "9/128 0 9/64 9/128", "7/90 0 4/15 1/15 4/45"],
  position: "7/90 0 4/15 1/15 4/45 0",
  velocity: "7/90 0 16/45 2/15 16/45 7/90",
  embedded: {
    id: "bettis-nystrom-54",
    title: "Bettis Nyström 5(4), variable step",
    order: 4,
    position: "1/6 0 0 1/3 0 0",
    velocity: "0 0 2/3 -1/3 2/3 0",
  },
};
