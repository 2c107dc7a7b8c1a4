import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import { type ComplexColumn, LEAST_SIEMENS } from './bus-admittance.js';
import { bankColumn } from './bus-columns.js';
import type { Flow } from './bus-flow.js';
import type { CornerCase } from './corners.js';
import type { NetworkModel } from './network-model.js';
import { NodalFlows } from './nodal-flow.js';
import { primaryVoltagesInto } from './primary-voltage.js';
import { stageAdmittance, stageBranch } from './stage-admittance.js';
import { type BankState, bankStates, stageKinds } from './stage-kinds.js';
import { combine } from './summation.js';

/** A bank's admittances at the orders present. */
export interface BankModel {
  bank: Bank;
  levels: Level[];
  /** electrical states of each level */
  states: BankState[][];
  /** [factors][group] */
  stages: ComplexColumn[][];
  /** |y| of the same [S] */
  stageSiemens: Float64Array[][];
}

/**
 * Tables one stage of every group in every tolerance corner at the orders present.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels
 * @returns admittances per factors and group
 * @source method-network
 */
export function bankModel(model: NetworkModel, bank: Bank, levels: Level[]): BankModel {
  const exponent = model.corners.networks[0]!.path.resistanceExponent;
  const kinds = stageKinds(bank);
  const stages = model.corners.factors.map((factors) =>
    bank.groups.map((group) => stageAdmittance(stageBranch(group, factors, exponent), model.excitation.ordersH)),
  );
  return {
    bank,
    levels,
    states: levels.map(({ vectors }) => bankStates(kinds, vectors)),
    stages,
    stageSiemens: stages.map((groups) => groups.map(({ re, im }) => re.map((g, i) => magnitude(g, im[i]!)))),
  };
}

/** What a caller of `eachFlow` can do without. */
export interface FlowChoice {
  /** the first level is the bank out, and is visited once a network: the bank's tolerances play no part in it */
  bareOnce?: boolean;
  /** in a network of several buses, false leaves the current of the source and its distortion at 0 */
  withSource?: boolean;
}

/**
 * Visits the flow of every level, corner and electrical state, in that order of nesting.
 * Z = 1/(Y₀ + Y_bank); from the loads V = |Z|·I, source current |Z/Z_s|·I; from the background E behind the source
 * V = |E·Z/Z_s|, source current |E·(1 − Z/Z_s)/Z_s|; each pair combined with the order's exponent. |Z| stands before
 * both voltages, so they are combined once, as currents I and E/|Z_s|.
 * @param model the network without the bank
 * @param bank the bank's admittances
 * @param visit called with one flow object that is reused
 * @param choice what need not be visited or filled
 * @source method-network
 */
export function eachFlow(
  model: NetworkModel,
  bank: BankModel,
  visit: (flow: Flow) => void,
  { bareOnce = false, withSource = true }: FlowChoice = {},
): void {
  const flow = emptyFlow(model, bank);
  const fill = filling(model, bank, withSource);
  const bareCorners = bareOnce ? firstCorners(model) : model.corners.corners;
  for (const [k, level] of bank.levels.entries()) {
    for (const corner of k === 0 ? bareCorners : model.corners.corners) {
      for (const { vector, connected } of bank.states[k]!) {
        flow.level = k;
        flow.levelKvar = level.levelKvar;
        flow.vector = vector;
        flow.connected = connected;
        flow.corner = corner;
        fill(flow);
        visit(flow);
      }
    }
  }
}

// What fills in the numbers of a flow whose level, corner and vector are set.
function filling(model: NetworkModel, bank: BankModel, withSource: boolean): (flow: Flow) => void {
  const nodal = model.nodal === null ? null : new NodalFlows(model, withSource);
  return (flow) => {
    const stages = bank.stages[flow.corner.factors]!;
    if (nodal === null) flowInto(model, bank, flow);
    else nodal.into(stages, flow);
    if (flow.primary !== null) finishPrimary(model, stages, flow);
  };
}

// One corner a network, the first of each.
function firstCorners({ corners: { corners, networks } }: NetworkModel): CornerCase[] {
  const seen = new Uint8Array(networks.length);
  return corners.filter(({ network }) => {
    const isFirst = seen[network] === 0;
    seen[network] = 1;
    return isFirst;
  });
}

function emptyFlow(model: NetworkModel, bank: BankModel): Flow {
  const n = model.excitation.ordersH.length;
  const voltageV = new Float64Array(n);
  return {
    level: 0,
    levelKvar: 0,
    vector: new Int32Array(bank.bank.groups.length),
    connected: new Uint8Array(bank.bank.groups.length),
    corner: model.corners.corners[0]!,
    ordersH: model.excitation.ordersH,
    voltageV,
    buses: model.buses.map((_, bus) => ({
      voltageV: bus === model.bankBus && model.nodal === null ? voltageV : new Float64Array(n),
      voltageDistortionPct: 0,
    })),
    primary: model.primary ? { voltageV: new Float64Array(n), voltageDistortionPct: 0 } : null,
    sourceA: new Float64Array(n),
    bankA: new Float64Array(n),
    stageA: bank.bank.groups.map(() => new Float64Array(n)),
    voltageDistortionPct: 0,
    currentDistortionPct: 0,
  };
}

function finishPrimary(model: NetworkModel, stages: readonly ComplexColumn[], flow: Flow): void {
  const { re, im } = bankColumn(stages, flow.vector, flow.ordersH.length);
  if (model.nodal === null) primaryVoltagesInto(model, flow, re, im);
  const primary = flow.primary!;
  const square = primary.voltageV.reduce((sum, v) => sum + v * v, 0);
  primary.voltageDistortionPct = (100 * Math.sqrt(square)) / (model.nominalV / Math.sqrt(3));
}

function flowInto(model: NetworkModel, bank: BankModel, flow: Flow): void {
  const { excitation, nominalV, loadA } = model;
  const { ordersH, injectedA, exponent } = excitation;
  const { bus, source } = model.atOrders[flow.corner.network]!;
  const { backgroundA, equivalentA, sourceOhm } = model.drives[flow.corner.network]!;
  const stages = bank.stages[flow.corner.factors]!;
  const stageSiemens = bank.stageSiemens[flow.corner.factors]!;
  const { vector, voltageV, sourceA, bankA, stageA } = flow;
  let voltageSquare = 0;
  let currentSquare = 0;
  for (let i = 0; i < ordersH.length; i++) {
    let bankRe = 0;
    let bankIm = 0;
    for (let g = 0; g < stages.length; g++) {
      bankRe += vector[g]! * stages[g]!.re[i]!;
      bankIm += vector[g]! * stages[g]!.im[i]!;
    }
    const yRe = bus.re[i]! + bankRe;
    const yIm = bus.im[i]! + bankIm;
    const zMagnitude = 1 / Math.max(LEAST_SIEMENS, magnitude(yRe, yIm));
    const sRe = source.re[i]!;
    const sIm = source.im[i]!;
    // E·(1 − Z/Z_s)/Z_s = (Z/Z_s)·(E/Z_s)·(Z_s·Y − 1): the share Z/Z_s stands before both currents of the source.
    const reaction = magnitude(sRe * yRe - sIm * yIm - 1, sRe * yIm + sIm * yRe);
    const v = zMagnitude * equivalentA[i]!;
    const a = (zMagnitude / sourceOhm[i]!) * combine(injectedA[i]!, backgroundA[i]! * reaction, exponent[i]!);
    voltageV[i] = v;
    sourceA[i] = a;
    bankA[i] = v * magnitude(bankRe, bankIm);
    for (let g = 0; g < stages.length; g++) stageA[g]![i] = v * stageSiemens[g]![i]!;
    voltageSquare += v * v;
    currentSquare += a * a;
  }
  flow.voltageDistortionPct = (100 * Math.sqrt(voltageSquare)) / (nominalV / Math.sqrt(3));
  flow.buses[0]!.voltageDistortionPct = flow.voltageDistortionPct;
  flow.currentDistortionPct = loadA > 0 ? (100 * Math.sqrt(currentSquare)) / loadA : 0;
}

// Math.hypot guards against overflow that impedances can't reach, and costs several times as much.
function magnitude(re: number, im: number): number {
  return Math.sqrt(re * re + im * im);
}
