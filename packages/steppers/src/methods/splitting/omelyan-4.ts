import type { Splitting } from "../method.ts";

/**
 * Digits: Published digits projected (minimum-norm Newton) onto the exact order-4 conditions; residual < 1.0e-60,
 * largest change of a coefficient 3.3e-17, free parameters: 1.
 */
export const omelyan4: Splitting = {
  id: "omelyan-4",
  title: "Omelyan–Mryglod–Folk 4",
  order: 4,
  source: "I.P. Omelyan, I.M. Mryglod, R. Folk, Comput. Phys. Commun. 146 (2002) 188-202",
  first: "drift",
  symmetric: true,
  weights: `
    0.1786178958448090670599037670811929367843 0.7123418310626054038318904580688403927837
    -0.06626458266981849627801562176460284253787 -0.2123418310626054038318904580688403927837
    0.7752933736500188584362237093668198115071
  `,
};
