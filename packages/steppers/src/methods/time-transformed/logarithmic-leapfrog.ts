import type { Published } from "../method.ts";

/** Two-body path exact; eccentric anomaly advances by 2 atan(s/2) a step, t_N = N s - e sin(2 N atan(s/2)) from periapsis. */
export const logarithmicLeapfrog: Published = {
  id: "logarithmic-leapfrog",
  title: "Logarithmic-Hamiltonian leapfrog, drift–kick–drift",
  order: 2,
  source:
    "S. Mikkola, K. Tanikawa, MNRAS 310 (1999) 745-749 and Celest. Mech. Dyn. Astron. 74 (1999) 287-295; M. Preto, S. Tremaine, AJ 118 (1999) 2532-2541; weight integrated as in S. Mikkola, S. Aarseth, Celest. Mech. Dyn. Astron. 84 (2002) 343-354",
  note: "Steps are equal in fictitious time (ds = dt / r), uneven in time. Symplectic in the extended phase space.",
};
