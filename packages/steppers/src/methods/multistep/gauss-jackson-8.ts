import type { Multistep } from "../method.ts";

/** Differences through the eighth, hence the name; the scheme shows order 10. */
export const gaussJackson8: Multistep = {
  id: "gauss-jackson-8",
  title: "Gauss–Jackson, eighth differences, predict–evaluate–correct–evaluate",
  order: 10,
  source:
    "J. Jackson, MNRAS 84 (1924) 602-606; M.M. Berry, L.M. Healy, J. Astronaut. Sci. 52 (2004) 331-357; series as E. Hairer, S.P. Nørsett, G. Wanner, Solving ODEs I, 2nd ed. (1993) sects. III.1, III.10",
  note: "Called eighth order after its differences; its order is 10.",
  backValues: 9,
};
