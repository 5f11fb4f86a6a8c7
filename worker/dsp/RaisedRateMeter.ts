/** All factors looked for divide this many phases. */
const phases = 840;
export const raisedFactors = [2, 3, 4, 5, 6, 7, 8] as const;
/** Between the knots of a raised capture nearly every difference is nothing; at the knots most are something. */
const leastStillShare = 0.95;
const largestKnotShare = 0.9;
/** How many standard errors the knots must differ from the places between them: no chance of it in any archive. */
const leastSigmas = 6;
const leastPerPhase = 40;
/** Differences within this many steps of the converter are nothing: three roundings come together in a second difference. */
const toleranceSteps = 2.5;
const toleranceShare = 1e-4;

export interface RaisedRate {
  /** How many times the rate was raised. */
  factor: number;
  /** `held`: values repeated; `straight`: straight lines between the old samples. */
  by: 'held' | 'straight';
  /** Share of the samples between the old ones that follow the rule. */
  followingShare: number;
}

/**
 * Tells from the samples themselves whether the rate was raised by a whole factor L with repeated values or straight lines:
 * then the first or the second difference is nothing at all places but every L-th. Counts, per place modulo 840,
 * how many differences are within the rounding, so that one jump decides nothing. Streamed; memory fixed.
 * Definition of both interpolators: Crochiere & Rabiner 1983, chapter 2.
 */
export class RaisedRateMeter {
  private readonly firstStill = new Uint32Array(phases);
  private readonly secondStill = new Uint32Array(phases);
  private readonly counts = new Uint32Array(phases);
  private readonly firstTolerance: number;
  private readonly secondTolerance: number;
  private place = 0;
  private seen = 0;
  private before = 0;
  private twoBefore = 0;

  /** @param quantum step between neighbouring codes, null where none shows; @param rms of the channel, same unit */
  constructor(quantum: number | null, rms: number) {
    this.firstTolerance = Math.max(0.5 * (quantum ?? 0), 1e-3 * toleranceShare * rms);
    this.secondTolerance = Math.max(toleranceSteps * (quantum ?? 0), toleranceShare * rms);
  }

  /** Samples must be finite. Blocks of any length give the same counts. */
  push(samples: Float64Array, frames: number): void {
    for (let n = 0; n < frames; n++) {
      const value = samples[n] as number;
      if (this.seen >= 2) {
        this.counts[this.place] = (this.counts[this.place] as number) + 1;
        if (Math.abs(value - this.before) <= this.firstTolerance)
          this.firstStill[this.place] = (this.firstStill[this.place] as number) + 1;
        // The bend at the sample before this one.
        if (Math.abs(value - 2 * this.before + this.twoBefore) <= this.secondTolerance)
          this.secondStill[this.place] = (this.secondStill[this.place] as number) + 1;
      } else this.seen++;
      this.twoBefore = this.before;
      this.before = value;
      this.place = this.place + 1 === phases ? 0 : this.place + 1;
    }
  }

  /** The largest factor that fits; null for none. */
  result(): RaisedRate | null {
    for (const factor of [...raisedFactors].reverse()) {
      for (const by of ['held', 'straight'] as const) {
        const followingShare = this.fits(factor, by === 'held' ? this.firstStill : this.secondStill);
        if (followingShare !== null) return { factor, by, followingShare };
      }
    }
    return null;
  }

  private fits(factor: number, still: Uint32Array): number | null {
    let perPhase = Infinity;
    const stillShares = Array.from({ length: factor }, (_, phase) => {
      let [quiet, all] = [0, 0];
      for (let place = phase; place < phases; place += factor) {
        quiet += still[place] as number;
        all += this.counts[place] as number;
      }
      perPhase = Math.min(perPhase, all);
      return all < leastPerPhase ? null : quiet / all;
    });
    if (stillShares.includes(null)) return null;
    const sorted = (stillShares as number[]).sort((a, b) => a - b);
    const [knot, following] = [sorted[0] as number, sorted[1] as number];
    const error = Math.sqrt(Math.max(following * (1 - following), 1 / perPhase) / perPhase);
    const differs = following - knot > leastSigmas * error;
    return following >= leastStillShare && knot <= largestKnotShare && differs ? following : null;
  }
}
