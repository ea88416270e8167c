import type { Composition } from "../method.ts";

/** Closed form: w1=w2=w4=w5=1/(4-4^(1/3)), w3=-4^(1/3)/(4-4^(1/3)). */
export const suzuki4: Composition = {
  id: "suzuki-4",
  title: "Suzuki 4",
  order: 4,
  source:
    "M. Suzuki, Phys. Lett. A 146 (1990) 319-323; E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer (2006) sect. II.4",
  factors: `
    0.4144907717943757371423540628607614957118 0.4144907717943757371423540628607614957118
    -0.6579630871775029485694162514430459828471
  `,
};
