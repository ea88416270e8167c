import type { EmbeddedTableau } from "../method.ts";

export const fehlberg5: EmbeddedTableau = {
  id: "fehlberg-5",
  title: "Fehlberg 5",
  order: 5,
  source: "E. Fehlberg, NASA TR R-315 (1969); Computing 6 (1970) 61-71",
  a: [
    "",
    "1/4",
    "3/32 9/32",
    "1932/2197 -7200/2197 7296/2197",
    "439/216 -8 3680/513 -845/4104",
    "-8/27 2 -3544/2565 1859/4104 -11/40",
  ],
  b: "16/135 0 6656/12825 28561/56430 -9/50 2/55",
  embedded: {
    id: "fehlberg-45",
    title: "Fehlberg 4(5), variable step",
    order: 4,
    advances: true,
    b: "25/216 0 1408/2565 2197/4104 -1/5 0",
  },
};
