import type { Extrapolation } from "../method.ts";

const source =
  "W.B. Gragg, SIAM J. Numer. Anal. 2 (1965) 384-403; R. Bulirsch, J. Stoer, Numer. Math. 8 (1966) 1-13; P. Deuflhard, Numer. Math. 41 (1983) 399-422; E. Hairer, S.P. Nørsett, G. Wanner, Solving ODEs I, 2nd ed. (1993) sect. II.9";

/** Up to four columns the sequence of Bulirsch and Stoer and the even harmonic one are the same. */
export const bulirschStoer8: Extrapolation = {
  id: "bulirsch-stoer-8",
  title: "Gragg–Bulirsch–Stoer, 4 columns",
  order: 8,
  source,
  basic: "modified-midpoint",
  sequence: "2 4 6 8",
  variable: { id: "bulirsch-stoer-86", title: "Gragg–Bulirsch–Stoer, 4 columns, variable step" },
};

export const bulirschStoer10: Extrapolation = {
  id: "bulirsch-stoer-10",
  title: "Gragg–Bulirsch–Stoer, 5 columns, sequence of Bulirsch and Stoer",
  order: 10,
  source,
  basic: "modified-midpoint",
  sequence: "2 4 6 8 12",
  variable: { id: "bulirsch-stoer-108", title: "Gragg–Bulirsch–Stoer, 5 columns, variable step" },
};

export const bulirschStoer12: Extrapolation = {
  id: "bulirsch-stoer-12",
  title: "Gragg–Bulirsch–Stoer, 6 columns, even harmonic sequence",
  order: 12,
  source,
  basic: "modified-midpoint",
  sequence: "2 4 6 8 10 12",
  variable: { id: "bulirsch-stoer-1210", title: "Gragg–Bulirsch–Stoer, 6 columns, variable step" },
};
