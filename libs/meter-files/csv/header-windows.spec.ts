import { describe, expect, it } from 'vitest';
import { lines } from '../../../test/support/meter-text.js';
import { headerWindows } from './header-windows.js';

function windowsOf(...rows: string[]) {
  const bytes = new TextEncoder().encode(lines(...rows));
  const view = { bytes, start: 0, end: bytes.length, rowEnd: 0x0a, rowsBefore: 100, ended: true };
  return [...headerWindows(view)].map(({ start, end, rowsBefore }) => ({
    rowsBefore,
    rows: new TextDecoder().decode(bytes.subarray(start, end)).trimEnd().split('\n'),
  }));
}

describe('the places where data may begin', () => {
  it('are where a dated line follows one without a date, with the lines around it', () => {
    const preamble = Array.from({ length: 20 }, (_, i) => `remark ${i}`);
    const data = Array.from({ length: 50 }, () => '2024-05-06 00:00,1,1');
    const [first, ...more] = windowsOf(...preamble, 'time,kW,kvar', ...data);
    expect(more).toEqual([]);
    expect(first!.rowsBefore).toBe(100 + 15);
    expect(first!.rows.slice(0, 7)).toEqual([...preamble.slice(15), 'time,kW,kvar', data[0]]);
    expect(first!.rows).toHaveLength(7 + 30);
  });

  it('are several where the preamble has dates of its own', () => {
    expect(windowsOf('printed 07.05.2024', 'time,kW', '2024-05-06,1').map(({ rows }) => rows[0])).toEqual([
      'printed 07.05.2024',
      'printed 07.05.2024',
    ]);
  });

  it.each(['2024-05-06', '6.5.2024', '05/06/24', '20240506', '00:15', '6 May 2024 0:15'])(
    'know "%s" for something like a date',
    (text) => {
      expect(windowsOf('name', `x;${text};1`)).toHaveLength(1);
    },
  );

  it.each(['name', '1.5;2.25', '1-2', '12345', 'a:b', '1:2'])('do not take "%s" for one', (text) => {
    expect(windowsOf('name', text)).toEqual([]);
  });
});
