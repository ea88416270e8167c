import type { Extrapolation } from "../method.ts";

const source =
  "J. Stoer (1972); E. Hairer, S.P. Nørsett, G. Wanner, Solving ODEs I, 2nd ed. (1993) sect. II.14";

export const stormerExtrapolation8: Extrapolation = {
  id: "stormer-extrapolation-8",
  title: "Extrapolated Størmer rule, 4 columns",
  order: 8,
  source,
  basic: "stormer",
  sequence: "1 2 3 4",
  variable: { id: "stormer-extrapolation-86", title: "Extrapolated Størmer rule, 4 columns, variable step" },
};

export const stormerExtrapolation12: Extrapolation = {
  id: "stormer-extrapolation-12",
  title: "Extrapolated Størmer rule, 6 columns",
  order: 12,
  source,
  basic: "stormer",
  sequence: "1 2 3 4 5 6",
  variable: {
    id: "stormer-extrapolation-1210",
    title: "Extrapolated Størmer rule, 6 columns, variable step",
  },
};
