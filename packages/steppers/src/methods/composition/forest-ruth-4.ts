import type { Composition } from "../method.ts";

/** Closed form: w1=w3=1/(2-2^(1/3)), w2=-2^(1/3)/(2-2^(1/3)). */
export const forestRuth4: Composition = {
  id: "forest-ruth-4",
  title: "Forest–Ruth 4 (triple jump)",
  order: 4,
  source:
    "E. Forest, R.D. Ruth, Physica D 43 (1990) 105-117; H. Yoshida, Phys. Lett. A 150 (1990) 262-268; M. Suzuki, Phys. Lett. A 146 (1990) 319-323; J. Candy, W. Rozmus, J. Comput. Phys. 92 (1991) 230-256",
  factors: "1.351207191959657634047687808971460826922 -1.702414383919315268095375617942921653844",
};
