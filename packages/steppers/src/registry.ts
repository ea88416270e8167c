import { forestRuth4 } from "./methods/composition/forest-ruth-4.ts";
import { kahanLi6, kahanLi8 } from "./methods/composition/kahan-li.ts";
import { sofroniouSpaletta10 } from "./methods/composition/sofroniou-spaletta-10.ts";
import { suzuki4 } from "./methods/composition/suzuki-4.ts";
import { suzukiUmeno8 } from "./methods/composition/suzuki-umeno-8.ts";
import { yoshida6, yoshida8 } from "./methods/composition/yoshida.ts";
import { bulirschStoer8, bulirschStoer10, bulirschStoer12 } from "./methods/extrapolation/bulirsch-stoer.ts";
import {
  stormerExtrapolation8,
  stormerExtrapolation12,
} from "./methods/extrapolation/stormer-extrapolation.ts";
import type {
  Composition,
  Extrapolation,
  NystromTableau,
  Splitting,
  Sundman,
  Tableau,
} from "./methods/method.ts";
import { bettisNystrom5 } from "./methods/nystrom/bettis-nystrom-5.ts";
import { dormandNystrom4 } from "./methods/nystrom/dormand-nystrom-4.ts";
import { dormandNystrom6 } from "./methods/nystrom/dormand-nystrom-6.ts";
import { dormandNystrom6Dense } from "./methods/nystrom/dormand-nystrom-6-dense.ts";
import { dormandNystrom8 } from "./methods/nystrom/dormand-nystrom-8.ts";
import { dormandNystrom12 } from "./methods/nystrom/dormand-nystrom-12.ts";
import { nystrom4, nystrom5 } from "./methods/nystrom/nystrom.ts";
import { bogackiShampine3 } from "./methods/runge-kutta/bogacki-shampine-3.ts";
import { bogackiShampine5 } from "./methods/runge-kutta/bogacki-shampine-5.ts";
import { cashKarp5 } from "./methods/runge-kutta/cash-karp-5.ts";
import { dormandPrince5 } from "./methods/runge-kutta/dormand-prince-5.ts";
import { dormandPrince8 } from "./methods/runge-kutta/dormand-prince-8.ts";
import { explicitEuler } from "./methods/runge-kutta/explicit-euler.ts";
import { explicitMidpoint } from "./methods/runge-kutta/explicit-midpoint.ts";
import { fehlberg5 } from "./methods/runge-kutta/fehlberg-5.ts";
import { heun2, heun3 } from "./methods/runge-kutta/heun.ts";
import { kutta38 } from "./methods/runge-kutta/kutta-38.ts";
import { ralston2 } from "./methods/runge-kutta/ralston-2.ts";
import { rk4 } from "./methods/runge-kutta/rk4.ts";
import { tsitouras5 } from "./methods/runge-kutta/tsitouras-5.ts";
import { verner61978 } from "./methods/runge-kutta/verner-6-1978.ts";
import { verner6Robust } from "./methods/runge-kutta/verner-6-robust.ts";
import { blanesMoan4, blanesMoan6 } from "./methods/splitting/blanes-moan.ts";
import {
  blanesMoanNystrom4,
  blanesMoanNystrom6,
  blanesMoanNystrom6Fine,
} from "./methods/splitting/blanes-moan-nystrom.ts";
import { calvoSanzSerna4 } from "./methods/splitting/calvo-sanz-serna-4.ts";
import { mclachlan4Five, mclachlan4Four } from "./methods/splitting/mclachlan-4.ts";
import {
  mclachlanAtela2,
  mclachlanAtela3,
  mclachlanAtela4,
  mclachlanAtela5,
} from "./methods/splitting/mclachlan-atela.ts";
import { omelyan4 } from "./methods/splitting/omelyan-4.ts";
import { ruth3 } from "./methods/splitting/ruth-3.ts";
import { leapfrog, velocityVerlet } from "./methods/splitting/second-order.ts";
import { symplecticEuler, symplecticEulerDk } from "./methods/splitting/symplectic-euler.ts";
import {
  sundmanDormandPrince5,
  sundmanDormandPrince8,
  sundmanRk4,
} from "./methods/time-transformed/sundman.ts";

// Every method that is data. A new one is a file and a line here: catalogue and proofs take it from these lists.

/** Explicit Runge-Kutta, by order. With an embedded formula: a fixed-step and a variable-step stepper. */
export const tableaus: readonly Tableau[] = [
  explicitEuler,
  explicitMidpoint,
  heun2,
  ralston2,
  heun3,
  bogackiShampine3,
  rk4,
  kutta38,
  cashKarp5,
  fehlberg5,
  dormandPrince5,
  bogackiShampine5,
  tsitouras5,
  verner61978,
  verner6Robust,
  dormandPrince8,
];

/** Runge-Kutta-Nystrom, by order; embedded as above. */
export const nystromTableaus: readonly NystromTableau[] = [
  nystrom4,
  nystrom5,
  dormandNystrom4,
  bettisNystrom5,
  dormandNystrom6,
  dormandNystrom6Dense,
  dormandNystrom8,
  dormandNystrom12,
];

/** Symplectic splittings, by order. */
export const splittings: readonly Splitting[] = [
  symplecticEuler,
  symplecticEulerDk,
  leapfrog,
  velocityVerlet,
  mclachlanAtela2,
  ruth3,
  mclachlanAtela3,
  mclachlanAtela4,
  calvoSanzSerna4,
  mclachlan4Four,
  mclachlan4Five,
  omelyan4,
  blanesMoan4,
  blanesMoanNystrom4,
  mclachlanAtela5,
  blanesMoan6,
  blanesMoanNystrom6,
  blanesMoanNystrom6Fine,
];

/** Symmetric compositions, by order: each over leapfrog and over velocity Verlet. */
export const compositions: readonly Composition[] = [
  forestRuth4,
  suzuki4,
  yoshida6,
  kahanLi6,
  yoshida8,
  kahanLi8,
  suzukiUmeno8,
  sofroniouSpaletta10,
];

/** Extrapolation with a fixed number of columns: a fixed-step and a variable-step stepper each. */
export const extrapolations: readonly Extrapolation[] = [
  bulirschStoer8,
  bulirschStoer10,
  bulirschStoer12,
  stormerExtrapolation8,
  stormerExtrapolation12,
];

/** Runge-Kutta methods with steps proportional to the distance. */
export const sundmans: readonly Sundman[] = [sundmanRk4, sundmanDormandPrince5, sundmanDormandPrince8];
