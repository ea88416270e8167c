import type { Splitting } from "../method.ts";

/**
 * Closed form: a1=(642+sqrt(471))/3924, a2=121(12-sqrt(471))/3924, a3=1-2(a1+a2); b1=6/11, b2=1/2-b1; drift first,
 * palindromic.
 */
export const mclachlan4Four: Splitting = {
  id: "mclachlan-4-four",
  title: "McLachlan 4, four kicks",
  order: 4,
  source: "R.I. McLachlan, SIAM J. Sci. Comput. 16 (1995) 151-168",
  first: "drift",
  symmetric: true,
  weights: `
    0.1691392799220720451750024659651743352139 0.5454545454545454545454545454545454545455
    -0.2991862039040507995086317151194278942115 -0.04545454545454545454545454545454545454545
    1.260093847963957508667258498308507117995
  `,
};

/**
 * Closed form: a1=(14-sqrt(19))/108, a2=(20-7 sqrt(19))/108, a3=1/2-a1-a2; b1=2/5, b2=-1/10, b3=1-2(b1+b2); drift first,
 * palindromic.
 */
export const mclachlan4Five: Splitting = {
  id: "mclachlan-4-five",
  title: "McLachlan 4, five kicks",
  order: 4,
  source: "R.I. McLachlan, SIAM J. Sci. Comput. 16 (1995) 151-168",
  first: "drift",
  symmetric: true,
  weights: `
    0.08926945422647524488669461126055911426725 0.4
    -0.09733604263689550801535994339830842235147 -0.1
    0.5080665884104202631286653321377493080842 0.4
  `,
};
