import type { Splitting } from "../method.ts";

export const symplecticEuler: Splitting = {
  id: "symplectic-euler",
  title: "Symplectic Euler, kick then drift",
  order: 1,
  source:
    "R. De Vogelaere (1956); E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed. (2006), sect. I.1.2",
  first: "kick",
  symmetric: false,
  weights: "1 1",
};
