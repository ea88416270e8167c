/**
 * Double-double arithmetic for proofs: each operation has relative error below 2^-98 away from overflow and underflow (T.J. Dekker, Numer.
 * Math. 18 (1971) 224-242; D.E. Knuth's two-sum). A result is left in `hi` and `lo` of the accumulator, so that nothing is allocated.
 */
export class Accumulator {
  hi = 0;
  lo = 0;

  set(hi: number, lo: number): void {
    this.hi = hi + lo;
    this.lo = lo - (this.hi - hi);
  }

  add(ah: number, al: number, bh: number, bl: number): void {
    const s = ah + bh;
    const v = s - ah;
    const e = ah - (s - v) + (bh - v);
    const t = al + bl;
    const w = t - al;
    const f = al - (t - w) + (bl - w);
    const m = e + t;
    const h = s + m;
    this.set(h, m - (h - s) + f);
  }

  mul(ah: number, al: number, bh: number, bl: number): void {
    const p = ah * bh;
    const a1 = split(ah);
    const a2 = ah - a1;
    const b1 = split(bh);
    const b2 = bh - b1;
    const e = a1 * b1 - p + a1 * b2 + a2 * b1 + a2 * b2;
    this.set(p, e + (ah * bl + al * bh));
  }

  /** Long division: two quotient digits of 53 bits and a correction. */
  div(ah: number, al: number, bh: number, bl: number): void {
    const q1 = ah / bh;
    this.mul(bh, bl, q1, 0);
    this.add(ah, al, -this.hi, -this.lo);
    const q2 = this.hi / bh;
    const [rh, rl] = [this.hi, this.lo];
    this.mul(bh, bl, q2, 0);
    this.add(rh, rl, -this.hi, -this.lo);
    const q3 = this.hi / bh;
    this.set(q1, q2);
    this.add(this.hi, this.lo, q3, 0);
  }

  /** One Newton step from the root of the leading part. */
  sqrt(ah: number, al: number): void {
    if (ah === 0) {
      this.set(0, 0);
      return;
    }
    const root = Math.sqrt(ah);
    this.mul(root, 0, root, 0);
    this.add(ah, al, -this.hi, -this.lo);
    const correction = this.hi / (2 * root);
    // The second-order term of the series: correction^2 / (2 root) is below 2^-106 root.
    this.add(root, 0, correction, 0);
  }
}

function split(a: number): number {
  const t = 134217729 * a;
  return t - (t - a);
}
