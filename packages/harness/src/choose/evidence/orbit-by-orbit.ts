import type { History } from "../../report/evidence.ts";
import type { ObservedPassage } from "../../score/passages.ts";

const MOST_PERIODS = 400;
const MOST_ENERGIES = 240;

type Oscillation = NonNullable<History["oscillation"]>;

/** What a run does orbit by orbit: the error of its periods, thinned evenly, and its energy error within the first orbit. */
export class OrbitByOrbit {
  readonly periods: { orbit: number; periodRelative: number }[] = [];
  private readonly stride: number;
  private readonly energies: Oscillation["points"][number][] = [];
  private passages = 0;
  private lastTiming: number | null = null;
  private periapsisAtOrbit: number | null = null;

  constructor(orbits: number) {
    this.stride = Math.max(1, Math.ceil(orbits / MOST_PERIODS));
  }

  /** Exact passages are one period apart, so the period error is the difference of successive timings. */
  acceptPassage({ atOrbit, timing }: ObservedPassage): void {
    if (atOrbit <= 1) this.periapsisAtOrbit = atOrbit;
    if (this.lastTiming !== null && this.passages % this.stride === 0) {
      this.periods.push({ orbit: atOrbit, periodRelative: timing - this.lastTiming });
    }
    this.lastTiming = timing;
    this.passages += 1;
  }

  acceptEnergy(orbit: number, energyRelative: number): void {
    this.energies.push({ orbit, energyRelative });
  }

  /** Of many steps every second, third... is kept. */
  oscillation(): Oscillation {
    const stride = Math.ceil(this.energies.length / MOST_ENERGIES);
    return {
      periapsisAtOrbit: this.periapsisAtOrbit,
      points: this.energies.filter((_, i) => i % stride === 0),
    };
  }
}
