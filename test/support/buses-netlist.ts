import type { Corner, Site } from '#libs/engine/index.js';

/** Where the source of a circuit stands: 1 A at a bus, or 1 V behind the supply. */
export type Drive = { bus: string } | 'background';

/** One circuit out of a site: a corner, the counts of stages, the place of the source. */
export interface Circuit {
  /** ends every name, so that several circuits can stand in one netlist */
  tag: string;
  corner: Corner;
  /** of the tolerance on a transformer's impedance: 0 as given, −1 least, 1 most */
  toleranceSign: number;
  /** connected stages per entry of the bank */
  counts: ArrayLike<number>;
  drive: Drive;
}

interface Ohm {
  /** resistance that does not grow with order */
  steady?: number;
  r: number;
  x: number;
  /** capacitive reactance, 0 for none */
  c?: number;
}

/**
 * A site's network as the lines of a netlist, from the site file alone: no part of the engine is asked.
 * @param site as given, with a network
 * @param circuit what stands how
 * @param orderH the order its resistances belong to
 * @returns elements; buses are nodes `n0…` and the source's current is that of `ls`, the bank's that of `va`, all with
 * the circuit's tag
 */
export function busesNetlist(site: Site, circuit: Circuit, orderH: number): string[] {
  const writer = new Writer(site, circuit, orderH);
  return [...writer.supply(), ...writer.links(), ...writer.machines(), ...writer.damping(), ...writer.capacitors()];
}

class Writer {
  readonly #site: Site;
  readonly #circuit: Circuit;
  readonly #growth: number;
  readonly #standing: string[];

  constructor(site: Site, circuit: Circuit, orderH: number) {
    this.#site = site;
    this.#circuit = circuit;
    this.#growth = orderH ** (site.supply.resistanceExponent ?? 0.5);
    this.#standing = (circuit.corner.standing ?? '').split(', ');
  }

  #node(bus: string | undefined): string {
    const index = bus === undefined ? 0 : this.#site.network!.buses.findIndex(({ name }) => name === bus);
    if (index < 0) throw new Error(`no bus ${bus}`);
    return `n${index}${this.#circuit.tag}`;
  }

  // Resistance, coil and capacitor in series; the coil's current can be read where there is one.
  #series(name: string, from: string, to: string, { steady = 0, r, x, c = 0 }: Ohm): string[] {
    const w = 2 * Math.PI * this.#site.frequencyHz;
    const parts: [string, number][] = [];
    if (steady + r > 0) parts.push(['r', steady + r * this.#growth]);
    if (x > 0) parts.push(['l', x / w]);
    if (c > 0) parts.push(['c', 1 / (w * c)]);
    const t = this.#circuit.tag;
    const joint = (k: number): string => (k === 0 ? from : k === parts.length ? to : `${name}j${k}${t}`);
    return parts.map(([kind, value], k) => `${kind}${name}${t} ${joint(k)} ${joint(k + 1)} ${value}`);
  }

  supply(): string[] {
    const { tag: t, drive, corner, toleranceSign } = this.#circuit;
    const { supply, bus } = this.#site;
    const transformers = supply.transformers ?? [];
    const z = bus.nominalV ** 2 / (corner.faultLevelMva * 1e6);
    const rOverX = supply.rOverX!;
    const x = z / Math.sqrt(1 + rOverX ** 2);
    const behind = transformers.length > 0 ? `prim${t}` : this.#node(undefined);
    return [
      `v${t} e${t} 0 dc 0 ac ${drive === 'background' ? 1 : 0}`,
      ...(drive === 'background' ? [] : [`i${t} 0 ${this.#node(drive.bus)} dc 0 ac 1`]),
      ...this.#series('s', `e${t}`, behind, { r: rOverX * x, x }),
      ...transformers.flatMap((transformer, k) => {
        if (this.#standing.includes(`transformer ${k + 1} out`)) return [];
        const baseOhm = bus.nominalV ** 2 / (transformer.ratedKva * 1000);
        const r = ((transformer.loadLossKw ?? 0) / transformer.ratedKva) * baseOhm;
        const tolerance = (toleranceSign * transformer.impedanceTolerancePct!) / 100;
        const zt = (transformer.impedancePct / 100) * (1 + tolerance) * baseOhm;
        return this.#series(`t${k}`, behind, this.#node(transformer.bus), { r, x: Math.sqrt(zt ** 2 - r ** 2) });
      }),
    ];
  }

  links(): string[] {
    const { couplers = [], cables = [] } = this.#site.network!;
    return [
      ...couplers.flatMap(({ name, between: [from, to], state }, k) => {
        const closed = state === 'closed' || this.#standing.includes(`${name ?? `coupler ${k + 1}`} closed`);
        return closed ? [`vk${k}${this.#circuit.tag} ${this.#node(from)} ${this.#node(to)} dc 0 ac 0`] : [];
      }),
      ...cables.flatMap(({ between: [from, to], lengthM, resistanceOhmPerKm, reactanceOhmPerKm, parallel = 1 }, k) => {
        const km = lengthM / 1000 / parallel;
        const ohm = { steady: resistanceOhmPerKm * km, r: 0, x: reactanceOhmPerKm * km };
        return this.#series(`w${k}`, this.#node(from), this.#node(to), ohm);
      }),
    ];
  }

  machines(): string[] {
    return (this.#site.network!.generators ?? []).flatMap((generator, k) => {
      const { name, bus, ratedKva, subtransientPct, rOverX = 0.15, state } = generator;
      const runs = state === 'running' || this.#standing.includes(`${name ?? `generator ${k + 1}`} running`);
      const x = ((subtransientPct / 100) * this.#site.bus.nominalV ** 2) / (ratedKva * 1000);
      return runs ? this.#series(`g${k}`, this.#node(bus), '0', { r: rOverX * x, x }) : [];
    });
  }

  // The corner's kW are those of the whole site, shared as the most of them would be.
  damping(): string[] {
    const { motors = [], resistive = [], bankBus } = this.#site.network!;
    const { loads } = this.#site;
    const own = loads!.dampingKw!.max!;
    const mostKw = [...motors, ...resistive].reduce((sum, { kw }) => sum + kw, own);
    const share = mostKw > 0 ? this.#circuit.corner.dampingKw / mostKw : 0;
    const ownMotorKw = (loads!.motorSharePct! / 100) * own;
    return [
      ...[...motors, { bus: bankBus, kw: ownMotorKw }].flatMap(({ bus, kw }, k) => {
        if (kw * share === 0) return [];
        const x = this.#site.bus.nominalV ** 2 / (kw * share * 1000) / 6;
        return this.#series(`m${k}`, this.#node(bus), '0', { r: 0.3 * x, x });
      }),
      ...[...resistive, { bus: bankBus, kw: own - ownMotorKw }].flatMap(({ bus, kw }, k) =>
        kw * share === 0
          ? []
          : [`rr${k}${this.#circuit.tag} ${this.#node(bus)} 0 ${this.#site.bus.nominalV ** 2 / (kw * share * 1000)}`],
      ),
    ];
  }

  capacitors(): string[] {
    const { tag: t, corner, counts } = this.#circuit;
    const { bank, network } = this.#site;
    const ohm = (stage: {
      ratedKvar: number;
      ratedV: number;
      reactorPct?: number;
      reactorQuality?: number;
    }): Required<Omit<Ohm, 'steady'>> => {
      const c = stage.ratedV ** 2 / (stage.ratedKvar * 1000);
      const x = ((stage.reactorPct ?? 0) / 100) * c;
      return { r: x / (stage.reactorQuality ?? 30), x, c };
    };
    const bankNode = `bank${t}`;
    return [
      `va${t} ${this.#node(network!.bankBus)} ${bankNode} dc 0 ac 0`,
      ...bank!.stages.flatMap((stage, g) =>
        Array.from({ length: counts[g]! }, (_, k) => {
          const { r, x, c } = ohm(stage);
          const inCorner = { r, x: x * corner.inductanceFactor, c: c / corner.capacitanceFactor };
          return this.#series(`b${g}x${k}`, bankNode, '0', inCorner);
        }).flat(),
      ),
      ...(network!.capacitors ?? []).flatMap((set, g) => {
        const name = set.name ?? `capacitors ${g + 1}`;
        const fewer = this.#standing.find((part) => part.endsWith(` of ${name}`));
        const count = fewer === undefined ? set.count : Number.parseInt(fewer, 10);
        return this.#beside(`f${g}`, this.#node(set.bus), count, ohm(set));
      }),
      ...(network!.banks ?? []).flatMap(({ name = '', bus, stages }, k) => {
        const counts = this.#stagesIn(name === '' ? `bank ${k + 1}` : name, stages);
        return stages.flatMap((stage, g) => this.#beside(`h${k}g${g}`, this.#node(bus), counts[g]!, ohm(stage)));
      }),
    ];
  }

  // "bank 1 out", "bank 1 with 2 + 0 stages in"; all in where nothing is said.
  #stagesIn(name: string, stages: readonly { count: number }[]): number[] {
    if (this.#standing.includes(`${name} out`)) return stages.map(() => 0);
    const told = this.#standing.find((part) => part.startsWith(`${name} with `));
    if (told === undefined) return stages.map(({ count }) => count);
    return told
      .slice(`${name} with `.length)
      .split(' + ')
      .map((count) => Number.parseInt(count, 10));
  }

  #beside(name: string, node: string, count: number, { r, x, c }: Required<Omit<Ohm, 'steady'>>): string[] {
    const { networkInductanceFactor = 1, networkCapacitanceFactor = 1 } = this.#circuit.corner;
    const inCorner = { r, x: x * networkInductanceFactor, c: c / networkCapacitanceFactor };
    return Array.from({ length: count }, (_, k) => this.#series(`${name}x${k}`, node, '0', inCorner)).flat();
  }
}
