import { ddOf, ddSubtract } from "../arithmetic/double-double.ts";
import { splitter } from "../arithmetic/two-product.ts";
import { requireEllipse, requireFinite } from "../errors.ts";
import { reduceAngle } from "../functions/reduce-angle.ts";
import { anomalyCorrection } from "./anomaly-correction.ts";
import { anomalyNode } from "./anomaly-node.ts";
import { smallAnomaly } from "./small-anomaly.ts";
import { startAnomaly } from "./starter.ts";

/** Nodes have 7 significant bits and lie in [2^-6, 3.25]. */
const firstExponent = -6;
const perOctave = 64;
/** Below this anomaly the series of E - sin E serves instead of the nodes. */
const smallest = 0.03125;
const nodeCount = 7 * perOctave + 41;
const bits: Float64Array = new Float64Array(1);
const words: Uint32Array = new Uint32Array(bits.buffer);
/** Of each node: E, sin E, 1 - cos E, E - sin E in a word of 26 bits and a rest; rows of 8. */
const nodes: Float64Array = new Float64Array(8 * nodeCount);
let ready = false;

function buildNodes(): void {
  for (let k = 0; k < nodeCount; k++) {
    const octave = Math.floor(k / perOctave);
    const node = anomalyNode((1 + (k % perOctave) / perOctave) * 2 ** (firstExponent + octave));
    const cut = splitter * node.lag.hi;
    const upper = cut - (cut - node.lag.hi);
    const versine = ddSubtract(ddOf(1), node.cos).hi;
    nodes.set([node.anomaly, node.sin.hi, versine, upper, node.lag.hi - upper + node.lag.lo], 8 * k);
  }
  ready = true;
}

/** E of M = mean + meanLow in (0, pi]. */
function solveHalfTurn(e: number, mean: number, meanLow: number): number {
  const complement = 1 - e;
  const complementLow = 1 - complement - e;
  const first = startAnomaly(e, complement, mean);
  if (first < smallest) return smallAnomaly(e, complement, complementLow, mean, meanLow, first);
  bits[0] = first;
  const at = 8 * (((words[1]! + 8192) >>> 14) - ((1023 + firstExponent) << 6));
  const anomaly = nodes[at]!;
  const eSin = e * nodes[at + 1]!;
  const eVersine = e * nodes[at + 2]!;
  // M_k = (1 - e) E_k + e (E_k - sin E_k), every product exact.
  const lag = nodes[at + 3]!;
  const cutComplement = splitter * complement;
  const c1 = cutComplement - (cutComplement - complement);
  const p = complement * anomaly;
  const pLow = c1 * anomaly - p + (complement - c1) * anomaly;
  const cutE = splitter * e;
  const e1 = cutE - (cutE - e);
  const s = e * lag;
  const sLow = e1 * lag - s + (e - e1) * lag;
  const node = p + s;
  const t = node - p;
  const nodeLow = p - (node - t) + (s - t) + (pLow + sLow + (e * nodes[at + 4]! + complementLow * anomaly));
  const r = complement + eVersine;
  const scale = 1 / r;
  const correction = anomalyCorrection(
    (mean - node + (meanLow - nodeLow)) * scale,
    eSin * scale,
    (e - eVersine) * scale,
  );
  return anomaly + correction;
}

const reduced: Float64Array = new Float64Array(2);

/**
 * Eccentric anomaly E (radians) of the mean anomaly M = E - e sin E (radians), for every 0 <= e < 1 and every finite M.
 *
 * Method: a starter within 5e-4 (Markley 1995), the nearest node E_k of a table with sin E_k, 1 - cos E_k and E_k - sin E_k, M_k = (1 -
 * e) E_k + e (E_k - sin E_k) in double-double, and one fourth-order step plus one Newton step for E - E_k without
 * trigonometry; below E = 1/32 the series of E - sin E replaces the table. No loop: the work hardly depends on e and M.
 *
 * Error at most 0.53 ulp of E for |M| <= pi and |M| >= 1e-300, e up to 1 - 2^-53 (0.513 in 1.5e5 points, both corners included),
 * 1 ulp beyond pi, where M is reduced by the exact 2 pi; a subnormal M costs its own digits. E(-M) = -E(M) to the bit. Only + - * / and
 * sqrt: the same bits in every engine.
 *
 * Conditioning: dE/E = (M/(E r)) dM/M with M/(E r) <= 1 (r = 1 - e cos E), so M known to its last bit gives E to its last
 * bit; but dE = (sin E/r) de, and near periapsis of a nearly parabolic orbit one unit in the last place of e is worth up to 2/E^2
 * units of E. Where precision matters there, 1 - e has to be known, rather than e.
 *
 * Source: Markley, Celest. Mech. Dyn. Astron. 63 (1995) 101 (starter); Dekker, Numer. Math. 18 (1971) 224 (exact products).
 * @throws InvalidInputError for an eccentricity outside [0, 1) or a mean anomaly that is not finite
 */
export function solveKepler(eccentricity: number, meanAnomaly: number): number {
  requireEllipse("solveKepler.eccentricity", eccentricity);
  requireFinite("solveKepler.meanAnomaly", meanAnomaly);
  if (meanAnomaly === 0) return meanAnomaly;
  if (!ready) buildNodes();
  let hi = meanAnomaly;
  let lo = 0;
  const outside = !(hi <= Math.PI && hi >= -Math.PI);
  if (outside) {
    reduceAngle(meanAnomaly, 4, reduced);
    hi = reduced[0]!;
    lo = reduced[1]!;
  }
  const half = solveHalfTurn(eccentricity, Math.abs(hi), hi < 0 ? -lo : lo);
  const anomaly = hi < 0 ? -half : half;
  return outside ? meanAnomaly + (anomaly - hi - lo) : anomaly;
}
