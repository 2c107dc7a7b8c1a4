import { duration } from './reading-progress.js';

/** The first line comes after so long, and each further one [ms]. */
const EVERY_MS = 1000;

/**
 * Says every second how far a plan is; one that is made within a second is made in silence.
 * @param say told each line
 * @param nowMs a clock that never runs backwards [ms]
 * @returns told each share that is done, 0 … 1
 */
export function judgingProgress(
  say: (line: string) => void,
  nowMs: () => number = () => performance.now(),
): (fraction: number) => void {
  const fromMs = nowMs();
  let saidMs = fromMs;
  return (fraction) => {
    const now = nowMs();
    if (now - saidMs < EVERY_MS || fraction <= 0 || fraction >= 1) return;
    saidMs = now;
    say(judgingLine(fraction, (now - fromMs) / 1000));
  };
}

/**
 * One line: what is done, at which rate, and the time left at that rate.
 * @param fraction share done, over 0
 * @param elapsedS time it took [s]
 */
export function judgingLine(fraction: number, elapsedS: number): string {
  const pctPerS = (100 * fraction) / elapsedS;
  const leftS = Math.ceil(((1 - fraction) * elapsedS) / fraction);
  const rate = pctPerS < 10 ? pctPerS.toFixed(1) : `${Math.round(pctPerS)}`;
  return `${Math.floor(100 * fraction)} % done, ${rate} % a second, about ${duration(leftS)} left`;
}
