/** Allowed shaft speeds; 0 < `minimumRpm` < `maximumRpm`. */
export interface SpeedRange {
  readonly minimumRpm: number;
  readonly maximumRpm: number;
}

/** Place of a speed on a logarithmic axis: 0 at the slowest, 1 at the fastest; clamped to the axis. */
export function logFraction(shaftSpeedRpm: number, { minimumRpm, maximumRpm }: SpeedRange): number {
  const fraction = Math.log(shaftSpeedRpm / minimumRpm) / Math.log(maximumRpm / minimumRpm);
  return Math.min(1, Math.max(0, fraction));
}

interface SpeedTick {
  readonly rpm: number;
  readonly isLabelled: boolean;
}

const STEPS_IN_DECADE = [1, 2, 5];
/** In a range narrower than this ratio the decades alone would label too little. */
const NARROW_RATIO = 100;

/** Ticks at 1, 2 and 5 in every decade of the range; the decades are labelled, in a narrow range all of them. */
export function decadeTicks({ minimumRpm, maximumRpm }: SpeedRange): SpeedTick[] {
  const isNarrow = maximumRpm / minimumRpm < NARROW_RATIO;
  const ticks: SpeedTick[] = [];
  for (let power = Math.floor(Math.log10(minimumRpm)); 10 ** power <= maximumRpm; power += 1) {
    for (const step of STEPS_IN_DECADE) {
      const rpm = step * 10 ** power;
      if (rpm >= minimumRpm && rpm <= maximumRpm) ticks.push({ rpm, isLabelled: step === 1 || isNarrow });
    }
  }
  return ticks;
}
