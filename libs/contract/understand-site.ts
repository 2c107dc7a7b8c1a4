import {
  awgAreaMm2,
  type BankInput,
  CABLE_REACTANCE_OHM_PER_KM,
  type CableInput,
  conductorOhmPerKm,
  type EstimateInput,
  faultLevelOfKa,
  faultLevelOfOhm,
  type GeneratorInput,
  type MonthlyBill,
  type NetworkInput,
  type RecordedBank,
  reactorPctOfTuned,
  type Site,
  type StageGroupInput,
  type SupplyInput,
  type Transformer,
  tanFromPowerFactor,
  type Understood,
} from '#libs/engine/index.js';
import { convertedQuantities } from './converted-quantities.js';
import type { SiteGiven } from './site-schema.js';

type GivenBank = NonNullable<SiteGiven['bank']>;
type GivenStage = GivenBank['stages'][number];
type GivenTransformer = NonNullable<SiteGiven['supply']['transformers']>[number];
type GivenNetwork = NonNullable<SiteGiven['network']>;
type GivenGenerator = NonNullable<GivenNetwork['generators']>[number];

/**
 * A site with every quantity in the one form the engine computes with; what stood in another form is listed.
 * @param given as the schema reads it
 * @param json what was read, for the units a person wrote
 * @returns the site, `understood` absent where nothing was converted
 */
export function understandSite(given: SiteGiven, json: unknown): Site {
  const said = new Said(given.frequencyHz);
  const { bank, network, supply, estimate, recordedBank, ...rest } = given;
  const site: Site = { ...rest, supply: said.supply(supply) };
  if (bank !== undefined) site.bank = said.bank(bank, 'bank');
  if (recordedBank !== undefined) site.recordedBank = said.recordedBank(recordedBank);
  if (network !== undefined) site.network = said.network(network);
  if (estimate !== undefined) site.estimate = said.estimate(estimate);
  const understood = [...said.list, ...convertedQuantities(json, given)];
  if (understood.length > 0) site.understood = understood;
  return site;
}

class Said {
  readonly list: Understood[] = [];
  readonly #frequencyHz: number;

  constructor(frequencyHz: number) {
    this.#frequencyHz = frequencyHz;
  }

  #say(path: string, given: string, value: number, unit: string): number {
    this.list.push({ path, given, value, unit });
    return value;
  }

  supply(given: SiteGiven['supply']): SupplyInput {
    const { faultLevelMva, faultLevel, xOverR, transformers, ...rest } = given;
    const supply: SupplyInput = {
      ...rest,
      ...(transformers === undefined ? {} : { transformers: transformers.map((one, i) => this.#transformer(one, i)) }),
      faultLevelMva: faultLevelMva ?? this.#faultLevel(faultLevel!),
    };
    if (xOverR !== undefined) supply.rOverX = this.#say('supply.xOverR', `X/R of ${xOverR}`, 1 / xOverR, '');
    return supply;
  }

  // P_k = r·S_r with r = u_k/√(1 + (X/R)²)
  #transformer({ xOverR, rOverX, ...given }: GivenTransformer, i: number): Transformer {
    const x = xOverR ?? (rOverX === undefined ? undefined : 1 / rOverX);
    if (x === undefined) return given;
    const lossKw = ((given.impedancePct / 100) * given.ratedKva) / Math.sqrt(1 + x * x);
    const [key, said] = xOverR === undefined ? ['rOverX', `R/X of ${rOverX}`] : ['xOverR', `X/R of ${xOverR}`];
    return { ...given, loadLossKw: this.#say(`supply.transformers[${i}].${key}`, said, lossKw, 'kW') };
  }

  #generator({ xOverR, ...given }: GivenGenerator, path: string): GeneratorInput {
    if (xOverR === undefined) return given;
    return { ...given, rOverX: this.#say(`${path}.xOverR`, `X/R of ${xOverR}`, 1 / xOverR, '') };
  }

  #faultLevel(given: NonNullable<SiteGiven['supply']['faultLevel']>): SupplyInput['faultLevelMva'] {
    const { maxMva, minMva, maxKa, minKa, minOhm, maxOhm, atKv = 0 } = given;
    const ends = [
      { key: 'max', mva: maxMva, ka: maxKa, ohm: minOhm },
      { key: 'min', mva: minMva, ka: minKa, ohm: maxOhm },
    ] as const;
    const [max, min] = ends.map(({ key, mva, ka, ohm }) => {
      const path = `supply.faultLevel`;
      const end = key === 'max' ? 'greatest' : 'least';
      if (mva !== undefined) return mva;
      if (ka !== undefined)
        return this.#say(path, `${ka} kA at ${atKv} kV, the ${end}`, faultLevelOfKa(ka, atKv), 'MVA');
      if (ohm === undefined) return undefined;
      return this.#say(path, `${ohm} Ω at ${atKv} kV, the ${end}`, faultLevelOfOhm(ohm, atKv), 'MVA');
    });
    return min === undefined ? { max: max! } : { max: max!, min };
  }

  bank<T extends Pick<GivenBank, 'stages'>>(given: T, path: string): Omit<T, 'stages'> & Pick<BankInput, 'stages'> {
    return { ...given, stages: given.stages.map((stage, g) => this.stage(stage, `${path}.stages[${g}]`)) };
  }

  recordedBank(given: NonNullable<SiteGiven['recordedBank']>): RecordedBank {
    if (given.state !== 'switching') return given;
    const { bank, ...rest } = given;
    return bank === undefined ? rest : { ...rest, bank: this.bank(bank, 'recordedBank.bank') };
  }

  stage<T extends GivenStage>(given: T, path: string): Omit<T, 'tunedHz' | 'tunedOrderH'> & StageGroupInput {
    const { tunedHz, tunedOrderH, ...stage } = given;
    if (tunedHz !== undefined) {
      const pct = reactorPctOfTuned(tunedHz / this.#frequencyHz);
      return { ...stage, reactorPct: this.#say(`${path}.tunedHz`, `tuned to ${tunedHz} Hz`, pct, '%') };
    }
    if (tunedOrderH !== undefined) {
      const pct = reactorPctOfTuned(tunedOrderH);
      return { ...stage, reactorPct: this.#say(`${path}.tunedOrderH`, `tuned to order ${tunedOrderH}`, pct, '%') };
    }
    return stage;
  }

  estimate({ bills, equipment }: NonNullable<SiteGiven['estimate']>): EstimateInput {
    return {
      ...(bills === undefined ? {} : { bills: bills.map((bill, k) => this.#bill(bill, `estimate.bills[${k}]`)) }),
      ...(equipment === undefined ? {} : { equipment }),
    };
  }

  #bill(
    { powerFactor, laggingKvarh, ...bill }: NonNullable<NonNullable<SiteGiven['estimate']>['bills']>[number],
    path: string,
  ): MonthlyBill {
    if (laggingKvarh !== undefined) return { ...bill, laggingKvarh };
    const kvarh = bill.activeKwh * tanFromPowerFactor(powerFactor!);
    return { ...bill, laggingKvarh: this.#say(`${path}.powerFactor`, `${powerFactor}`, kvarh, 'kvarh') };
  }

  network(given: GivenNetwork): NetworkInput {
    const { cables, capacitors, banks, generators, ...rest } = given;
    return {
      ...rest,
      ...(cables === undefined ? {} : { cables: cables.map((cable, i) => this.#cable(cable, `network.cables[${i}]`)) }),
      ...(capacitors === undefined
        ? {}
        : { capacitors: capacitors.map((stage, i) => this.stage(stage, `network.capacitors[${i}]`)) }),
      ...(generators === undefined
        ? {}
        : { generators: generators.map((one, i) => this.#generator(one, `network.generators[${i}]`)) }),
      ...(banks === undefined ? {} : { banks: banks.map((bank, i) => this.bank(bank, `network.banks[${i}]`)) }),
    };
  }

  #cable(given: NonNullable<GivenNetwork['cables']>[number], path: string): CableInput {
    const { crossSectionMm2, sizeAwg, metal = 'copper', resistanceOhmPerKm, reactanceOhmPerKm, ...cable } = given;
    return {
      ...cable,
      resistanceOhmPerKm: resistanceOhmPerKm ?? this.#resistance({ crossSectionMm2, sizeAwg, metal }, path),
      reactanceOhmPerKm:
        reactanceOhmPerKm ??
        this.#say(`${path}.reactanceOhmPerKm`, 'a cable of the usual make', CABLE_REACTANCE_OHM_PER_KM, 'Ω/km'),
    };
  }

  #resistance(
    given: { crossSectionMm2?: number | undefined; sizeAwg?: string | undefined; metal: 'copper' | 'aluminium' },
    path: string,
  ): number {
    const { crossSectionMm2, sizeAwg, metal } = given;
    const areaMm2 = crossSectionMm2 ?? awgAreaMm2(sizeAwg!);
    const size = crossSectionMm2 === undefined ? `${sizeAwg} AWG` : `${Number(crossSectionMm2.toPrecision(6))} mm²`;
    const key = crossSectionMm2 === undefined ? 'sizeAwg' : 'crossSectionMm2';
    return this.#say(`${path}.${key}`, `${size} ${metal} at 20 °C`, conductorOhmPerKm(areaMm2, metal), 'Ω/km');
  }
}
