import { describe, expect, it } from 'vitest';
import { Attempts } from './attempts.js';

const MINUTE_MS = 60_000;
const tries = (attempts: Attempts, name: string, count: number, nowMs = 0) => {
  for (let i = 0; i < count; i++) attempts.count(name, nowMs);
};

describe('tries of a password', () => {
  it('are ten in a quarter of an hour, then none until the oldest is that old', () => {
    const attempts = new Attempts();
    tries(attempts, 'a', 10);
    expect(() => attempts.count('a', 14 * MINUTE_MS)).toThrow(/wait 1 min/);
    expect(() => attempts.count('a', 15 * MINUTE_MS)).not.toThrow();
  });

  it('are counted by name, and forgotten once one was right', () => {
    const attempts = new Attempts();
    tries(attempts, 'a', 10);
    expect(() => attempts.count('b', 0)).not.toThrow();
    attempts.forget('a');
    expect(() => attempts.count('a', 0)).not.toThrow();
  });

  it('that are refused do not put off the moment at which one may try again', () => {
    const attempts = new Attempts();
    tries(attempts, 'a', 10);
    for (let minute = 1; minute < 15; minute++) expect(() => attempts.count('a', minute * MINUTE_MS)).toThrow();
    expect(() => attempts.count('a', 15 * MINUTE_MS)).not.toThrow();
  });

  it('of ever new names do not fill memory: the one tried longest ago is forgotten', () => {
    const attempts = new Attempts();
    tries(attempts, 'first', 10);
    for (let i = 0; i < 10_000; i++) attempts.count(`name ${i}`, 0);
    expect(() => attempts.count('first', 0)).not.toThrow();
  });
});
