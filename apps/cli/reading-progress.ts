import type { InputFile } from './input-file.js';

/** The first line comes after so long, and each further one [ms]. */
const EVERY_MS = 1000;
const MB = 1e6;

/** How far the reading of a file is. */
export interface ReadSoFar {
  readBytes: number;
  /** undefined where it is not known */
  sizeBytes: number | undefined;
  elapsedS: number;
}

/**
 * Passes a file on and says every second how far it is; a file that is read within a second passes in silence.
 * @param file the file
 * @param say told each line
 * @param nowMs a clock that never runs backwards [ms]
 * @returns the file's chunks
 */
export async function* withProgress(
  { bytes, sizeBytes }: InputFile,
  say: (line: string) => void,
  nowMs: () => number = () => performance.now(),
): AsyncGenerator<Uint8Array> {
  const fromMs = nowMs();
  let saidMs = fromMs;
  let readBytes = 0;
  for await (const chunk of bytes) {
    readBytes += chunk.length;
    const now = nowMs();
    if (now - saidMs >= EVERY_MS) {
      saidMs = now;
      say(progressLine({ readBytes, sizeBytes, elapsedS: (now - fromMs) / 1000 }));
    }
    yield chunk;
  }
}

/**
 * One line: what is read, at which rate, and the time left at that rate.
 * @param soFar bytes read and the time they took [s]
 */
export function progressLine({ readBytes, sizeBytes, elapsedS }: ReadSoFar): string {
  const rate = readBytes / elapsedS;
  const speed = `${megabytes(rate)}/s`;
  if (sizeBytes === undefined || sizeBytes < readBytes) return `${megabytes(readBytes)} read, ${speed}`;
  const share = Math.floor((100 * readBytes) / sizeBytes);
  const leftS = Math.ceil((sizeBytes - readBytes) / rate);
  return `${share} % of ${megabytes(sizeBytes)} read, ${speed}, about ${duration(leftS)} left`;
}

function megabytes(bytes: number): string {
  const value = bytes / MB;
  return `${value < 10 ? value.toFixed(1) : Math.round(value)} MB`;
}

/** A time left as a person says it. */
export function duration(seconds: number): string {
  return seconds < 120 ? `${seconds} s` : `${Math.round(seconds / 60)} min`;
}
