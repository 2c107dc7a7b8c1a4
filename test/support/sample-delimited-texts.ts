import type { Dialect } from './slow-meter-reading.js';

const two = (part: number) => String(part).padStart(2, '0');
const parts = (momentS: number) => new Date(momentS * 1000).toISOString();
const slashed = (momentS: number) => {
  const iso = parts(momentS);
  return `${iso.slice(8, 10)}/${iso.slice(5, 7)}/${iso.slice(0, 4)} ${iso.slice(11, 16)}`;
};

/** Invented loads with three, two and no decimals, some below 1 so that the decimal mark is settled. */
function rows(count: number, row: (i: number, kw: number, kvar: number) => string): string[] {
  return Array.from({ length: count }, (_, i) =>
    row(i, 40 + ((i * 37) % 101) / 8, i % 7 === 0 ? 0.25 : 20 + ((i * 53) % 89) / 4),
  );
}

const START = Date.UTC(2024, 4, 11, 22) / 1000;
const ENERGIES = ['active energy kWh', 'reactive energy lagging kvarh', 'reactive energy leading kvarh'];

/** Delimited texts with invented loads, for tests that damage files, and how each is written. */
export const DELIMITED_TEXTS: { name: string; text: string; dialect: Dialect }[] = [
  {
    name: 'signed power, ISO stamps',
    dialect: { delimiter: ',', decimal: '.', dates: 'ymd', stamp: 'begin' },
    text: [
      'interval begin,active power [kW],reactive power [kvar]',
      ...rows(
        160,
        (i, kw, kvar) =>
          `${parts(START + i * 900)
            .slice(0, 16)
            .replace('T', ' ')},${kw},${i % 9 === 0 ? -kvar : kvar}`,
      ),
    ].join('\n'),
  },
  {
    name: 'energies, decimal comma, day first',
    dialect: { delimiter: ';', decimal: ',', dates: 'dmy', stamp: 'end' },
    text: [
      'Interval end time;Active energy (kWh);Reactive energy lagging (kvarh);Reactive energy leading (kvarh)',
      ...rows(
        150,
        (i, kw, kvar) =>
          `${slashed(START + i * 900)};${String(kw).replace('.', ',')};${String(kvar).replace('.', ',')};0`,
      ),
    ].join('\r\n'),
  },
  {
    name: 'midnight under the ending day',
    dialect: { delimiter: ',', decimal: '.', dates: 'dmy', stamp: 'endOldDate' },
    text: [
      'date,Usage_kWh,Lagging_kVarh,Leading_kVarh,Power_Factor,NSM',
      ...rows(96 * 2, (i, kw, kvar) => {
        const momentS = Date.UTC(2024, 4, 14) / 1000 + (i + 1) * 900;
        const stamp = momentS % 86_400 === 0 ? `${slashed(momentS - 86_400).slice(0, 10)} 00:00` : slashed(momentS);
        return `${stamp},${kw},${kvar},0,${80 + (i % 20)},${momentS % 86_400}`;
      }),
    ].join('\r\n'),
  },
  {
    name: 'own offsets across an autumn night, quoted cells',
    dialect: { delimiter: ',', decimal: '.', dates: 'ymd', stamp: 'begin' },
    text: [
      '"begin","kW","reactive kvar"',
      ...rows(140, (i, kw, kvar) => {
        const momentS = Date.UTC(2024, 9, 26, 20) / 1000 + i * 900;
        const hours = momentS < Date.UTC(2024, 9, 27, 1) / 1000 ? 2 : 1;
        return `"${parts(momentS + hours * 3600).slice(0, 19)}+${two(hours)}:00","${kw}",${kvar}`;
      }),
    ].join('\n'),
  },
  {
    name: 'a row for each channel and moment, in turns',
    dialect: {
      delimiter: ',',
      decimal: '.',
      dates: 'ymd',
      stamp: 'begin',
      long: { time: 0, channel: 1, value: 2, unit: 3, channels: ['active power [kW]', 'reactive power [kvar]'] },
    },
    text: [
      'interval begin,channel,value,unit',
      ...rows(70, (i, kw, kvar) => {
        const stamp = parts(START + i * 900)
          .slice(0, 16)
          .replace('T', ' ');
        const cells = [
          `active power,${kw},kW`,
          `reactive power,${i % 9 === 0 ? -kvar : kvar},kvar`,
          `room,${18 + (i % 5) / 2},°C`,
        ];
        return cells.map((cell) => `${stamp},${cell}`).join('\n');
      }),
    ].join('\n'),
  },
  {
    name: 'a row for each channel and moment, one channel after the other',
    dialect: {
      delimiter: ';',
      decimal: ',',
      dates: 'dmy',
      stamp: 'end',
      long: { time: 0, channel: 1, value: 2, unit: null, channels: ENERGIES },
    },
    text: [
      'Interval end time;Channel;Value',
      ...ENERGIES.flatMap((name, k) =>
        rows(
          60,
          (i, kw, kvar) =>
            `${slashed(START + 172_800 + i * 900)};${name};${String([kw, kvar, i % 3][k]).replace('.', ',')}`,
        ),
      ),
    ].join('\r\n'),
  },
  {
    name: 'numbers for missing ones, and a column that goes through such numbers',
    dialect: { delimiter: ',', decimal: '.', dates: 'ymd', stamp: 'begin' },
    text: [
      'interval begin,active power [kW],reactive power [kvar]',
      ...rows(150, (i, _, kvar) => {
        const stamp = parts(START + i * 900)
          .slice(0, 16)
          .replace('T', ' ');
        return `${stamp},${i % 40 === 17 ? -99_999 : 985 + Math.floor(i / 8) * 2},${i % 50 === 30 ? -32_768 : kvar}`;
      }),
    ].join('\n'),
  },
];
