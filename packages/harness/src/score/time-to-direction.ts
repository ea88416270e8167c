import { angleOf } from "./angle-difference.ts";

/**
 * Time until the body reaches the direction (dx, dy), by the exact Kepler flow of its osculating orbit; negative where it is past it, the
 * shorter way round. For nearly circular orbits (it serves the returns of the polar angle at e = 0): the mean anomaly is formed from the
 * eccentric one on both sides, with an error of a few ulp of a radian.
 */
export function timeToDirection(
  x: number,
  y: number,
  vx: number,
  vy: number,
  dx: number,
  dy: number,
): number {
  const r = Math.sqrt(x * x + y * y);
  const momentum = x * vy - y * vx;
  const a = 1 / (2 / r - (vx * vx + vy * vy));
  const ex = vy * momentum - x / r;
  const ey = -vx * momentum - y / r;
  const eccentricity = Math.sqrt(ex * ex + ey * ey);
  // Sine and cosine of the true anomaly here and there; on an exact circle the body's own direction stands for periapsis.
  const px = eccentricity > 0 ? ex / eccentricity : x / r;
  const py = eccentricity > 0 ? ey / eccentricity : y / r;
  const d = Math.sqrt(dx * dx + dy * dy);
  const here = meanAnomaly(eccentricity, (px * x + py * y) / r, (px * y - py * x) / r);
  const there = meanAnomaly(eccentricity, (px * dx + py * dy) / d, (px * dy - py * dx) / d);
  let difference = there - here;
  if (difference > Math.PI) difference -= 2 * Math.PI;
  else if (difference < -Math.PI) difference += 2 * Math.PI;
  return difference * a * Math.sqrt(a);
}

function meanAnomaly(eccentricity: number, cosTrue: number, sinTrue: number): number {
  const scale = 1 / (1 + eccentricity * cosTrue);
  const sinEccentric = Math.sqrt(1 - eccentricity * eccentricity) * sinTrue * scale;
  const cosEccentric = (eccentricity + cosTrue) * scale;
  return angleOf(sinEccentric, cosEccentric) - eccentricity * sinEccentric;
}
