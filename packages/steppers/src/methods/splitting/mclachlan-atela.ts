import type { Splitting } from "../method.ts";

/** Closed form: a1=1/sqrt(2), a2=1-a1; b1=1-1/sqrt(2), b2=1/sqrt(2); kick b1, drift a1, kick b2, drift a2. */
export const mclachlanAtela2: Splitting = {
  id: "mclachlan-atela-2",
  title: "McLachlan–Atela 2",
  order: 2,
  source: "R.I. McLachlan, P. Atela, Nonlinearity 5 (1992) 541-562",
  first: "kick",
  symmetric: false,
  weights: `
    0.2928932188134524755991556378951509607152 0.7071067811865475244008443621048490392848
    0.7071067811865475244008443621048490392848 0.2928932188134524755991556378951509607152
  `,
};

/**
 * Digits: One free number a1, solved from the order-3 condition to 40 digits (a2=1/(4a1)-a1/2, a3=1-a1-a2, b=reversed
 * a).
 */
export const mclachlanAtela3: Splitting = {
  id: "mclachlan-atela-3",
  title: "McLachlan–Atela 3",
  order: 3,
  source: "R.I. McLachlan, P. Atela, Nonlinearity 5 (1992) 541-562",
  first: "kick",
  symmetric: false,
  weights: `
    0.2683300957817599249569552299254991394812 0.9196615230173998570508976381533827895633
    -0.1879916187991597820078528680788819290445 -0.1879916187991597820078528680788819290445
    0.9196615230173998570508976381533827895633 0.2683300957817599249569552299254991394812
  `,
};

/**
 * Digits: Published digits projected (minimum-norm Newton) onto the exact order-4 conditions; residual < 1.0e-60,
 * largest change of a coefficient 7.0e-20, free parameters: 1.
 */
export const mclachlanAtela4: Splitting = {
  id: "mclachlan-atela-4",
  title: "McLachlan–Atela 4",
  order: 4,
  genericOrder: 3,
  source: "R.I. McLachlan, P. Atela, Nonlinearity 5 (1992) 541-562",
  first: "kick",
  symmetric: false,
  weights: `
    0.1344961992774310892055064604585957388524 0.5153528374311229364001750586248288441895
    -0.2248198030794208058171809489467871171358 -0.08578201941297364607000340696020795067650
    0.7563200005156682911124975448405539605294 0.4415830236164665242530612821822822941240
    0.3340036032863214254991769436476374177540 0.1288461583653841854167670661530968123631
  `,
};

/**
 * Digits: Published digits projected (minimum-norm Newton) onto the exact order-5 conditions; residual < 1.0e-60,
 * largest change of a coefficient 3.5e-19, free parameters: 1.
 */
export const mclachlanAtela5: Splitting = {
  id: "mclachlan-atela-5",
  title: "McLachlan–Atela 5",
  order: 5,
  genericOrder: 3,
  source: "R.I. McLachlan, P. Atela, Nonlinearity 5 (1992) 541-562",
  first: "kick",
  symmetric: false,
  weights: `
    0.1193900292875672757946361760337133352159 0.3398396258391100000002594128544637334086
    0.6989273703824752308346490434144751145940 -0.08860133690302732865254033627137775777658
    -0.1713123582716007754075364378068779224135 0.5858564768259621188100874358673177288111
    0.4012695022513534479958287872529082862645 -0.6030393565364918881986069962221282984555
    0.01070508184823598398738116420316283991805 0.3235807965546976393257049386583803715519
    -0.05897962549803116320495873309738165357890 0.4423637942197494587150955451133442224605
  `,
};
