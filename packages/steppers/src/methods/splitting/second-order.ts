import type { Splitting } from "../method.ts";

const verlet =
  "C. Størmer, Arch. Sci. Phys. Nat. Genève 24 (1907); L. Verlet, Phys. Rev. 159 (1967) 98-103; W.C. Swope, H.C. Andersen, P.H. Berens, K.R. Wilson, J. Chem. Phys. 76 (1982) 637-649";

export const leapfrog: Splitting = {
  id: "leapfrog",
  title: "Leapfrog, drift–kick–drift",
  order: 2,
  source: `${verlet}; M. Tuckerman, B.J. Berne, G.J. Martyna, J. Chem. Phys. 97 (1992) 1990-2001`,
  first: "drift",
  symmetric: true,
  weights: "1/2 1",
};

export const velocityVerlet: Splitting = {
  id: "velocity-verlet",
  title: "Velocity Verlet, kick–drift–kick",
  order: 2,
  source: verlet,
  first: "kick",
  symmetric: true,
  weights: "1/2 1",
};
