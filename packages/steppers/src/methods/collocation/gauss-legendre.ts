import type { Collocation } from "../method.ts";

const source =
  "P.C. Hammer, J.W. Hollingsworth, MTAC 9 (1955) 92-96; J. Kuntzmann (1961); J.C. Butcher, Math. Comp. 18 (1964) 50-64; E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed. (2006) sect. II.1.3";

/** Nodes: the zeros of the shifted Legendre polynomial of degree half the order; everything else follows by integration. */
export const gaussLegendre: readonly Collocation[] = [
  {
    id: "gauss-legendre-2",
    title: "Implicit midpoint (Gauss–Legendre 2)",
    order: 2,
    source,
    nodes: "0.5",
  },
  {
    id: "gauss-legendre-4",
    title: "Gauss–Legendre 4",
    order: 4,
    source,
    nodes: "0.2113248654051871177454256097490212721762 0.7886751345948128822545743902509787278238",
  },
  {
    id: "gauss-legendre-6",
    title: "Gauss–Legendre 6",
    order: 6,
    source,
    nodes: "0.1127016653792583114820734600217600389167 0.5 0.8872983346207416885179265399782399610833",
  },
  {
    id: "gauss-legendre-8",
    title: "Gauss–Legendre 8",
    order: 8,
    source,
    nodes: `
      0.06943184420297371238802675555359524745214 0.3300094782075718675986671204483776563997
      0.6699905217924281324013328795516223436003 0.9305681557970262876119732444464047525479
    `,
  },
  {
    id: "gauss-legendre-10",
    title: "Gauss–Legendre 10",
    order: 10,
    source,
    nodes: `
      0.04691007703066800360118656085030351743717 0.2307653449471584544818427896498955975164 0.5
      0.7692346550528415455181572103501044024836 0.9530899229693319963988134391496964825628
    `,
  },
  {
    id: "gauss-legendre-12",
    title: "Gauss–Legendre 12",
    order: 12,
    source,
    nodes: `
      0.03376524289842398609384922275300269543262 0.1693953067668677431693002024900473264968
      0.3806904069584015456847491391596440322907 0.6193095930415984543152508608403559677093
      0.8306046932331322568306997975099526735032 0.9662347571015760139061507772469973045674
    `,
  },
];
