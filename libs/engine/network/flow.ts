import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import { type ComplexColumn, LEAST_SIEMENS } from './bus-admittance.js';
import type { Flow } from './bus-flow.js';
import type { NetworkModel } from './network-model.js';
import { nodalFlowInto } from './nodal-flow.js';
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
  return {
    bank,
    levels,
    states: levels.map(({ vectors }) => bankStates(kinds, vectors)),
    stages: model.corners.factors.map((factors) =>
      bank.groups.map((group) => stageAdmittance(stageBranch(group, factors, exponent), model.excitation.ordersH)),
    ),
  };
}

/**
 * Visits the flow of every level, corner and electrical state, in that order of nesting.
 * Z = 1/(Y₀ + Y_bank); from the loads V = |Z|·I, source current |Z/Z_s|·I; from the background E behind the source
 * V = |E·Z/Z_s|, source current |E·(1 − Z/Z_s)/Z_s|; each pair combined with the order's exponent. |Z| stands before
 * both voltages, so they are combined once, as currents I and E/|Z_s|.
 * @param model the network without the bank
 * @param bank the bank's admittances
 * @param visit called with one flow object that is reused
 * @source method-network
 */
export function eachFlow(model: NetworkModel, bank: BankModel, visit: (flow: Flow) => void): void {
  const n = model.excitation.ordersH.length;
  const voltageV = new Float64Array(n);
  const flow: Flow = {
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
    sourceA: new Float64Array(n),
    bankA: new Float64Array(n),
    stageA: bank.bank.groups.map(() => new Float64Array(n)),
    voltageDistortionPct: 0,
    currentDistortionPct: 0,
  };
  for (const [k, level] of bank.levels.entries()) {
    for (const corner of model.corners.corners) {
      for (const { vector, connected } of bank.states[k]!) {
        flow.level = k;
        flow.levelKvar = level.levelKvar;
        flow.vector = vector;
        flow.connected = connected;
        flow.corner = corner;
        if (model.nodal === null) flowInto(model, bank.stages[corner.factors]!, flow);
        else nodalFlowInto(model, bank.stages[corner.factors]!, flow);
        visit(flow);
      }
    }
  }
}

function flowInto(model: NetworkModel, stages: readonly ComplexColumn[], flow: Flow): void {
  const { excitation, nominalV, loadA } = model;
  const table = model.atOrders[flow.corner.network]!;
  const drive = model.drives[flow.corner.network]!;
  let voltageSquare = 0;
  let currentSquare = 0;
  for (let i = 0; i < excitation.ordersH.length; i++) {
    let bankRe = 0;
    let bankIm = 0;
    for (let g = 0; g < stages.length; g++) {
      bankRe += flow.vector[g]! * stages[g]!.re[i]!;
      bankIm += flow.vector[g]! * stages[g]!.im[i]!;
    }
    const yRe = table.bus.re[i]! + bankRe;
    const yIm = table.bus.im[i]! + bankIm;
    const zMagnitude = 1 / Math.max(LEAST_SIEMENS, magnitude(yRe, yIm));
    const sRe = table.source.re[i]!;
    const sIm = table.source.im[i]!;
    // E·(1 − Z/Z_s)/Z_s = (Z/Z_s)·(E/Z_s)·(Z_s·Y − 1): the share Z/Z_s stands before both currents of the source.
    const reaction = magnitude(sRe * yRe - sIm * yIm - 1, sRe * yIm + sIm * yRe);
    const background = drive.backgroundA[i]! * reaction;
    const v = zMagnitude * drive.equivalentA[i]!;
    const source =
      (zMagnitude / drive.sourceOhm[i]!) * combine(excitation.injectedA[i]!, background, excitation.exponent[i]!);
    flow.voltageV[i] = v;
    flow.sourceA[i] = source;
    flow.bankA[i] = v * magnitude(bankRe, bankIm);
    for (let g = 0; g < stages.length; g++) {
      flow.stageA[g]![i] = v * magnitude(stages[g]!.re[i]!, stages[g]!.im[i]!);
    }
    voltageSquare += v * v;
    currentSquare += source * source;
  }
  flow.voltageDistortionPct = (100 * Math.sqrt(voltageSquare)) / (nominalV / Math.sqrt(3));
  flow.buses[0]!.voltageDistortionPct = flow.voltageDistortionPct;
  flow.currentDistortionPct = loadA > 0 ? (100 * Math.sqrt(currentSquare)) / loadA : 0;
}

// Math.hypot guards against overflow that impedances can't reach, and costs several times as much.
function magnitude(re: number, im: number): number {
  return Math.sqrt(re * re + im * im);
}
