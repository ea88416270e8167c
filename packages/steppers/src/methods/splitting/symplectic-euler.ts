import type { Splitting } from "../method.ts";

export const symplecticEuler: Splitting = {
  id: "symplectic-euler",
  title: "Symplectic Euler, kick then drift",
  order: 1,
  source:
    "R. de Vogelaere, Univ. Notre Dame report (1956); E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer (2006) sect. I.1.2; A. Cromer, Am. J. Phys. 49 (1981) 455-459",
  first: "kick",
  symmetric: false,
  weights: "1 1",
};

export const symplecticEulerDk: Splitting = {
  id: "symplectic-euler-dk",
  title: "Symplectic Euler, drift then kick",
  order: 1,
  source:
    "R. de Vogelaere, Univ. Notre Dame report (1956); E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer (2006) sect. I.1.2",
  first: "drift",
  symmetric: false,
  weights: "1 1",
};
