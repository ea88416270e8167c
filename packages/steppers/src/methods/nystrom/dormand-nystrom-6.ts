import type { EmbeddedNystrom } from "../method.ts";

export const dormandNystrom6: EmbeddedNystrom = {
  id: "dormand-nystrom-6",
  title: "Dormand–El-Mikkawy–Prince Nyström 6",
  order: 6,
  source: "J.R. Dormand, M.E.A. El-Mikkawy, P.J. Prince, IMA J. Numer. Anal. 7 (1987) 235-250",
  c: "0 1/10 3/10 7/10 17/25 1",
  a: [
    "",
    "1/200",
    "-1/2200 1/22",
    "637/6600 -7/110 7/33",
    "225437/1968750 -30073/281250 65569/281250 -9367/984375",
    "151/2142 5/116 385/1368 55/168 -6250/28101",
  ],
  position: "151/2142 5/116 385/1368 55/168 -6250/28101 0",
  velocity: "151/2142 25/522 275/684 275/252 -78125/112404 1/12",
  embedded: {
    id: "dormand-nystrom-64",
    title: "Dormand–El-Mikkawy–Prince Nyström 6(4), variable step",
    order: 4,
    position: "1349/157500 7873/50000 192199/900000 521683/2100000 -16/125 0",
    velocity: "1349/157500 7873/45000 27457/90000 521683/630000 -2/5 1/12",
  },
};
