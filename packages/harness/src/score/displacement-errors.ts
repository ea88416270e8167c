/** Beyond this phase error, rad, the along-track error is measured along the orbit and no longer along the velocity. */
export const ALONG_TRACK_PHASE_LIMIT = 0.1;

/**
 * Position difference, numerical minus exact, over the semi-major axis: its length (`position`), its component along the exact velocity
 * (`alongTrack`; where |phase| > 0.1 rad the phase error itself) and along the exact position (`radial`), for rows `from` to `to`.
 */
export function displacementErrors(
  rows: Float64Array,
  exact: Float64Array,
  phase: Float64Array,
  from: number,
  to: number,
  position: Float64Array,
  alongTrack: Float64Array,
  radial: Float64Array,
): void {
  for (let i = from; i < to; i++) {
    const xe = exact[4 * i]!;
    const ye = exact[4 * i + 1]!;
    const vxe = exact[4 * i + 2]!;
    const vye = exact[4 * i + 3]!;
    const dx = rows[4 * i]! - xe;
    const dy = rows[4 * i + 1]! - ye;
    const angle = phase[i]!;
    position[i] = Math.sqrt(dx * dx + dy * dy);
    radial[i] = (dx * xe + dy * ye) / Math.sqrt(xe * xe + ye * ye);
    alongTrack[i] =
      angle > ALONG_TRACK_PHASE_LIMIT || angle < -ALONG_TRACK_PHASE_LIMIT
        ? angle
        : (dx * vxe + dy * vye) / Math.sqrt(vxe * vxe + vye * vye);
  }
}
