import { describe, expect, it } from 'vitest';
import { COMMON_CATALOGUE, layouts, preferred, type Sized, settleCatalogue } from './candidates.js';

describe('layouts of a catalogue', () => {
  const written = (stageKvar: number[], maxStages: number): string[] =>
    layouts({ stageKvar, maxStages }).map(({ count, sizeKvar, halves }) => `${halves}×½+${count}×${sizeKvar}`);

  it('are n of one size, or one or two of half that size and the rest of it', () => {
    expect(written([10, 20], 3)).toEqual([
      '0×½+1×10',
      '0×½+2×10',
      '0×½+3×10',
      '0×½+1×20',
      '0×½+2×20',
      '0×½+3×20',
      '1×½+1×20',
      '1×½+2×20',
      '2×½+1×20',
    ]);
  });

  it('take a half only where it is in the list', () => {
    expect(written([15, 20], 2)).toEqual(['0×½+1×15', '0×½+2×15', '0×½+1×20', '0×½+2×20']);
  });
});

describe('a catalogue', () => {
  it('that is not given is the shipped one, and each list of it an assumption', () => {
    const { catalogue, absent } = settleCatalogue(undefined, 2);
    expect(catalogue.stageKvar).toEqual([...COMMON_CATALOGUE.stageKvar]);
    expect(absent).toEqual(['stageKvar', 'ratedV', 'reactorPct', 'maxStages']);
    expect(catalogue).toMatchObject({ maxTotalKvar: null, interStageUh: 2, interStageGiven: false });
  });

  it('is read ascending and without repeats, whatever order it was written in', () => {
    const { catalogue, absent } = settleCatalogue({ stageKvar: [50, 25, 50], interStageUh: 5 }, 2);
    expect(catalogue).toMatchObject({ stageKvar: [25, 50], interStageUh: 5, interStageGiven: true });
    expect(absent).toEqual(['ratedV', 'reactorPct', 'maxStages']);
  });

  it('without any inductance between stages is refused', () => {
    expect(() => settleCatalogue({ interStageUh: 0 }, 2)).toThrow('catalogue.interStageUh');
  });
});

describe('of two candidates', () => {
  const base: Sized = { effectiveKvar: 100, stages: 4, smallestKvar: 25, reactorPct: 0 };

  it.each([
    [{}, { reactorPct: 7, effectiveKvar: 50 }, 'the plain one, though larger'],
    [{}, { effectiveKvar: 101 }, 'the smaller'],
    [{}, { effectiveKvar: 100 * (1 - 1e-12), stages: 5 }, 'of equal totals, to rounding, the one with fewer stages'],
    [{ smallestKvar: 30 }, {}, 'then the one with the larger smallest stage'],
    [{ reactorPct: 5.67 }, { reactorPct: 7 }, 'then the one with the smaller reactor'],
  ])('%j comes before %j: %s', (a, b, _why) => {
    expect(preferred({ ...base, ...a }, { ...base, ...b })).toBeLessThan(0);
    expect(preferred({ ...base, ...b }, { ...base, ...a })).toBeGreaterThan(0);
  });
});
