import { type PlanarState, solveKepler } from "@perigauge/kepler";
import { Decimal, type Precise, precise, preciseTwoPi } from "./precise.ts";

/** The exact orbit through a state of doubles, in 60 digits, written from the textbook and from nothing of the package. */
export interface PreciseOrbit {
  readonly a: Precise;
  readonly e: Precise;
  readonly meanMotion: Precise;
  readonly start: { readonly x: Precise; readonly y: Precise; readonly vx: Precise; readonly vy: Precise };
  readonly eCos: Precise;
  readonly eSin: Precise;
  readonly startMean: Precise;
}

/** Angle of (x, y) from the arctangent of the half angle. */
function angleOf(y: Precise, x: Precise): Precise {
  const length = x.mul(x).add(y.mul(y)).sqrt();
  if (y.isZero()) return x.isNegative() ? preciseTwoPi.div(2) : new Decimal(0);
  return x.isNegative()
    ? Decimal.atan(length.sub(x).div(y)).mul(2)
    : Decimal.atan(y.div(length.add(x))).mul(2);
}

export function preciseOrbit(state: PlanarState): PreciseOrbit {
  const x = precise(state.x);
  const y = precise(state.y);
  const vx = precise(state.vx);
  const vy = precise(state.vy);
  const r = x.mul(x).add(y.mul(y)).sqrt();
  const a = new Decimal(1).div(new Decimal(2).div(r).sub(vx.mul(vx)).sub(vy.mul(vy)));
  const eCos = new Decimal(1).sub(r.div(a));
  const eSin = x.mul(vx).add(y.mul(vy)).div(a.sqrt());
  const e = eCos.mul(eCos).add(eSin.mul(eSin)).sqrt();
  return {
    a,
    e,
    meanMotion: new Decimal(1).div(a.mul(a.sqrt())),
    start: { x, y, vx, vy },
    eCos,
    eSin,
    startMean: e.isZero() ? new Decimal(0) : angleOf(eSin, eCos).sub(eSin),
  };
}

/** Position at a time, by Kepler's equation for the difference of eccentric anomalies (Lagrange's f and g). */
export function precisePosition(
  orbit: PreciseOrbit,
  time: Precise,
): { readonly x: Precise; readonly y: Precise } {
  const { a, eCos, eSin, meanMotion, start } = orbit;
  const elapsed = meanMotion.mul(time);
  const change = elapsed.sub(preciseTwoPi.mul(elapsed.div(preciseTwoPi).round()));
  const mean = orbit.startMean.add(change);
  const wrapped = mean.sub(preciseTwoPi.mul(mean.div(preciseTwoPi).round()));
  // A start from the package's solver; three corrections in 60 digits make it independent.
  let anomaly = new Decimal(solveKepler(orbit.e.toNumber(), wrapped.toNumber()));
  for (let k = 0; k < 3; k++) {
    const f = anomaly.sub(orbit.e.mul(Decimal.sin(anomaly))).sub(wrapped);
    anomaly = anomaly.sub(f.div(new Decimal(1).sub(orbit.e.mul(Decimal.cos(anomaly)))));
  }
  const startAnomaly = orbit.startMean.add(eSin);
  const difference = anomaly.sub(startAnomaly);
  const sin = Decimal.sin(difference);
  const versine = new Decimal(1).sub(Decimal.cos(difference));
  const r0 = a.mul(new Decimal(1).sub(eCos));
  const f = new Decimal(1).sub(a.div(r0).mul(versine));
  const lag = difference.sub(sin);
  const kepler = difference.sub(eCos.mul(sin)).add(eSin.mul(versine));
  const g = kepler.sub(lag).div(meanMotion);
  return { x: f.mul(start.x).add(g.mul(start.vx)), y: f.mul(start.y).add(g.mul(start.vy)) };
}
