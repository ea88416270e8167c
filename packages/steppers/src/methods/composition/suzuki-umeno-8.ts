import type { Composition } from "../method.ts";

/**
 * Digits: Published digits projected (minimum-norm Newton) onto the exact order conditions, middle weight from
 * consistency; largest change 4.1e-27; free parameters: 0.
 */
export const suzukiUmeno8: Composition = {
  id: "suzuki-umeno-8",
  title: "Suzuki–Umeno 8",
  order: 8,
  source:
    "M. Suzuki, K. Umeno, in: Computer Simulation Studies in Condensed-Matter Physics VI, Springer (1993) 74-86; R.I. McLachlan, SIAM J. Sci. Comput. 16 (1995) 151-168; E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed., Springer (2006) sect. V.3.2",
  factors: `
    0.7416703643506129534482278017838063156035 -0.4091008258000315939973000958935634173099
    0.1907547102962383799538762564503716627355 -0.5738624711160822666563877266355357421595
    0.2990641813036559238444635406886029882258 0.3346249182452981837849579798821822886337
    0.3152930923967665966320566638110024309941 -0.7968879393529163540197888401737330534463
  `,
};
