import type { Composition } from "../method.ts";

/** Digits: Isolated solution, Newton to 60 digits; largest difference from the published digits 2.7e-15. */
export const yoshida6: Composition = {
  id: "yoshida-6",
  title: "Yoshida 6, solution A",
  order: 6,
  source: "H. Yoshida, Phys. Lett. A 150 (1990) 262-268, Table 1",
  factors: `
    0.7845136104775572638194976338663498757768 0.2355732133593581336847931829785346016865
    -1.177679984178871006946415680964315734639 1.315186320683911218884249728238862514352
  `,
};

/**
 * Digits: Isolated solution, Newton to 60 digits; largest difference from the published digits 2.3e-13 (the last 2-3
 * published digits are not exact).
 */
export const yoshida8: Composition = {
  id: "yoshida-8",
  title: "Yoshida 8, solution D",
  order: 8,
  source: "H. Yoshida, Phys. Lett. A 150 (1990) 262-268, Table 2",
  factors: `
    0.9148442462297915667487934898475096045181 0.2536933365662113541461460206899420760977
    -1.444852236860605157694730657537390354956 -0.1582406353680501752040667767597542477554
    1.938139137622525986579186487443641760954 -1.960610232975310807607633376399663640792
    0.1027998493917964406981151316012258629110 1.708453070787281584668379362228977878047
  `,
};
