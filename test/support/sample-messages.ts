const START = Date.UTC(2024, 4, 5, 22) / 1000;
const stamp = (momentS: number) => new Date(momentS * 1000).toISOString().replace(/\D/g, '').slice(0, 12);

/** Invented loads of two columns. */
const value = (i: number, k: number) => String((k === 0 ? 10 : 4) + ((i * 37 + k * 11) % 29) / 8);

/** An MSCONS message of ten hours. */
export function msconsText(): string {
  const items = ['1-1:1.29.0', '1-1:5.29.0', '1-1:8.29.0'].flatMap((code, k) => [
    `LIN+${k + 1}`,
    `PIA+5+${code.replace(':', '?:')}:SRW`,
    ...Array.from({ length: 40 }, (_, i) => [
      `QTY+${i % 13 === 5 ? 67 : 220}:${k === 2 ? 0 : value(i, k)}:${k === 0 ? 'KWH' : 'K3'}`,
      `DTM+163:${stamp(START + i * 900)}?+00:303`,
      `DTM+164:${stamp(START + (i + 1) * 900)}?+00:303`,
    ]).flat(),
  ]);
  const body = ['UNH+1+MSCONS:D:04B:UN:2.3c', 'BGM+7+D1+9', 'UNS+D', 'NAD+DP', 'LOC+172+SITE', ...items];
  const all = ['UNB+UNOC:3+A+B+240506:0012+R', ...body, `UNT+${body.length + 1}+1`, 'UNZ+1+R'];
  return `UNA:+.? '\n${all.join("'\n")}'\n`;
}

/** A load profile of three stretches with gaps between them. */
export function profileText(): string {
  const head = (i: number) =>
    `P.01(2${stamp(START + (i + 1) * 900).slice(2)}00)(00)(15)(3)(1.5)(kW)(3.5)(kvar)(9.5)(kVA)`;
  const row = (i: number) => `(${value(i, 0)})(${value(i, 1)})(14.5)`;
  const day = (from: number) => [head(from), ...Array.from({ length: 32 }, (_, i) => row(from + i))];
  return ['0.0.0(10000001)', ...day(0), ...day(40), ...day(80), '!', ''].join('\r\n');
}

/** Three invented days of one meter, active and reactive, with substitutes on the second. */
export function nem12Text(): string {
  const days = [0, 1, 2].flatMap((day) =>
    [
      ['E1', 'KWH', 20],
      ['Q1', 'KVARH', 12],
    ].flatMap(([suffix, unit, base]) => {
      const values = Array.from({ length: 48 }, (_, i) => (Number(base) + ((i * 37 + day * 11) % 29) / 4).toFixed(3));
      const rows = [
        `200,6100000042,E1Q1,${suffix},${suffix},N1,00042,${unit},30,`,
        `300,2024050${6 + day},${values.join(',')},${day === 1 ? 'V' : 'A'},,,20240601120000,`,
      ];
      return day === 1 ? [...rows, '400,1,20,A,,', '400,21,24,N,,', '400,25,48,F14,32,'] : rows;
    }),
  );
  return ['100,NEM12,202406010900,INVENTED,PLANNER', ...days, '900'].join('\r\n');
}
