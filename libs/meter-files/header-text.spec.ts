import { describe, expect, it } from 'vitest';
import { lines, streamOf } from '../../test/support/meter-text.js';
import { headerText } from './header-text.js';

const headerOf = (...rows: string[]) => headerText(streamOf(lines(...rows)));
const DATA = ['2025-03-01 00:00,1.5,0.3', '2025-03-01 00:15,1.7,0.2'];

describe('the header of a meter file', () => {
  it('is the row above the data, without differences of case and spaces', async () => {
    expect(await headerOf('Time, Active (kW),Reactive  (kvar)', ...DATA)).toBe('time, active (kw),reactive (kvar)');
    const one = await headerOf('Station 12', 'Printed 2026-01-05', 'Time,P,Q', ...DATA);
    const other = await headerOf('Station 7', '', 'Time,P,Q', DATA[1]!);
    expect(one).toBe('time,p,q');
    expect(other).toBe(one);
  });

  it('is names and units where both stand', async () => {
    expect(await headerOf('Time;P;Q', ';kW;kvar', '01.03.2025 00:00;1,5;0,3')).toBe('time;p;q\n;kw;kvar');
    expect(await headerOf('Time;P;Q', ';kW;var', '01.03.2025 00:00;1,5;0,3')).not.toBe('time;p;q\n;kw;kvar');
  });

  it('is the same whatever the file is encoded in', async () => {
    const text = lines('Time,P,Q', ...DATA);
    const utf16 = Uint8Array.from(Buffer.from(`\ufeff${text}`, 'utf16le'));
    expect(await headerText(streamOf(utf16))).toBe('time,p,q');
  });

  it('is read without keeping the file open', async () => {
    let closed = false;
    async function* source() {
      try {
        for (;;) yield new TextEncoder().encode(lines('Time,P,Q', ...DATA));
      } finally {
        closed = true;
      }
    }
    expect(await headerText(source())).toBe('time,p,q');
    expect(closed).toBe(true);
  });

  it.each([
    ['data from the first row on', DATA],
    ['no data', ['Time,P,Q']],
    ['nothing', []],
    ['one column', ['Time', '2025-03-01 00:00']],
    ['bytes that are no text', ['a,b\u0000', ...DATA]],
  ])('is not there in a file of %s', async (_what, rows) => {
    expect(await headerOf(...rows)).toBeNull();
  });
});
