import type { Splitting } from "../method.ts";

/**
 * Digits: Published digits projected (minimum-norm Newton) onto the exact order-4 conditions; residual < 1.0e-60,
 * largest change of a coefficient 5.2e-15, free parameters: 2.
 */
export const calvoSanzSerna4: Splitting = {
  id: "calvo-sanz-serna-4",
  title: "Calvo–Sanz-Serna 4",
  order: 4,
  genericOrder: 3,
  source:
    "M.P. Calvo, J.M. Sanz-Serna, SIAM J. Sci. Comput. 14 (1993) 936-952; J.M. Sanz-Serna, M.P. Calvo, Int. J. Mod. Phys. C 4 (1993) 385-392",
  first: "kick",
  symmetric: false,
  weights: `
    0.06175885813562880656600787490168196073415 0.2051776615422892565166489038627776335665
    0.3389780265536420232779951633943683809222 0.4030212816042118297717387048425963625902
    0.6147913071755781099102698635650010755118 -0.1209208763389116025349391201203442990256
    -0.1405480146593752292829038866214189211073 0.5127219331924105162465515114149703028689
    0.1250198227945262895286309847603675039392
  `,
};
