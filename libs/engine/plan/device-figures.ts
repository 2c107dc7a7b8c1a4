import { bankCurrentA, INSTANTANEOUS_RATIO } from '../duty/bank-devices.js';
import { AIR, CAPACITOR_LOSS_W_PER_KVAR, type CabinetHeat } from '../duty/cabinet-heat.js';
import { responseA, smallestKvar } from '../duty/controller-devices.js';
import type { Devices } from '../duty/devices.js';
import { FAULT_CURRENT_EDITION, type FaultCurrent } from '../duty/fault-current.js';
import { CAPACITOR_RULES, type RuleSet } from '../duty/rules.js';
import { leastRatedV, type StageDemand } from '../duty/stage-demand.js';
import { LINEAR_RATIO, stageA, stageReactanceOhm, voltageChangePct } from '../duty/stage-devices.js';
import type { Bank } from '../layout/bank.js';
import { effectiveKvar, stageOhm } from '../layout/stage.js';
import { summarizeNetwork } from '../network/network-check.js';
import type { Control } from '../operation/control.js';
import { type Figure, figure } from './figure.js';
import type { Judged } from './judge-basis.js';

const PRACTICE = 'common practice';

/**
 * Figures of the devices: fault currents, heat and air, response current, and per group voltage change, reactor and ripple.
 * @param judged settled site and its network
 * @param bank the bank, not empty
 * @param control settings
 * @param equipment the numbers behind the table of devices
 * @returns figures
 * @source method-figures
 */
export function deviceFigures(judged: Judged, bank: Bank, control: Control, equipment: Devices): Figure[] {
  return [
    ...bank.groups.flatMap((_, g) => groupFigures(judged, bank, g, equipment)),
    ...faultFigures(judged, equipment.fault),
    ...settingFigures(judged, bank),
    ...heatFigures(equipment.heat),
    ...responseFigures(judged, bank, control),
  ];
}

function ratedVoltageFigure(demand: StageDemand, rules: RuleSet, g: number): Figure {
  const { source, highestVoltageRatio, continuousVoltageRatio } = CAPACITOR_RULES[rules];
  const value = { value: leastRatedV(demand, rules), unit: 'V' };
  const forHours = [
    ['U_C', demand.risenV, 'V'],
    ['k', highestVoltageRatio, ''],
  ] as const;
  const id = `devices.group[${g}].leastRatedV`;
  if (continuousVoltageRatio === null) return figure(id, value, { formula: 'U_C / k', source }, forHours);
  return figure(id, value, { formula: 'max(U_C / k, U_1 / m)', source }, [
    ...forHours,
    ['U_1', demand.continuousV, 'V'],
    ['m', continuousVoltageRatio, ''],
  ]);
}

function groupFigures(judged: Judged, bank: Bank, g: number, { demand }: Devices): Figure[] {
  const { nominalV, rules, supply, frequencyHz } = judged.site;
  const group = bank.groups[g]!;
  const { shortCircuitMinMva } = summarizeNetwork(judged.model, []);
  const kvar = effectiveKvar(group, nominalV);
  const found = [
    figure(
      `devices.group[${g}].voltageChangePct`,
      { value: voltageChangePct(kvar, shortCircuitMinMva), unit: '%' },
      { formula: '100 · Q / (1000 · S_k)', source: 'method, requirement' },
      [
        ['Q', kvar, 'kvar'],
        ['S_k', shortCircuitMinMva, 'MVA'],
      ],
    ),
    ratedVoltageFigure(demand.groups[g]!, rules, g),
  ];
  if (group.reactorPct > 0) {
    const fundamentalA = stageA(group, nominalV);
    found.push(
      figure(
        `devices.group[${g}].linearA`,
        { value: Math.max(demand.groups[g]!.sumA, LINEAR_RATIO * fundamentalA), unit: 'A' },
        { formula: 'max(I_s, k · I_1)', source: PRACTICE },
        [
          ['I_s', demand.groups[g]!.sumA, 'A'],
          ['k', LINEAR_RATIO, ''],
          ['I_1', fundamentalA, 'A'],
        ],
      ),
    );
  }
  if (supply.rippleHz !== null) {
    const { inductiveOhm, capacitiveOhm } = stageOhm(group);
    found.push(
      figure(
        `devices.group[${g}].rippleOhm`,
        { value: stageReactanceOhm(group, supply.rippleHz, frequencyHz), unit: 'Ω' },
        { formula: 'f_r / f · X_L − X_C · f / f_r', source: 'method, network' },
        [
          ['f_r', supply.rippleHz, 'Hz'],
          ['f', frequencyHz, 'Hz'],
          ['X_L', inductiveOhm, 'Ω'],
          ['X_C', capacitiveOhm, 'Ω'],
        ],
      ),
    );
  }
  return found;
}

function faultFigures(judged: Judged, fault: FaultCurrent): Figure[] {
  const { nominalV } = judged.site;
  const edition = { source: FAULT_CURRENT_EDITION };
  return [
    figure(
      'devices.greatestFaultKa',
      { value: fault.greatestKa, unit: 'kA' },
      { formula: 'c · U / (√(3) · √(R^2 + X^2)) + I_m', ...edition },
      [
        ['c', fault.cMax, ''],
        ['U', nominalV, 'V'],
        ['R', 1000 * fault.rOhm, 'mΩ'],
        ['X', 1000 * fault.xOhm, 'mΩ'],
        ['I_m', fault.motorKa, 'kA'],
      ],
    ),
    figure('devices.peakFaultKa', { value: fault.peakKa, unit: 'kA' }, { formula: 'κ · √(2) · I_k', ...edition }, [
      ['κ', fault.kappa, ''],
      ['I_k', fault.greatestKa, 'kA'],
    ]),
    figure('devices.shortTimeKa', { value: fault.thermalKa, unit: 'kA' }, { formula: 'I_k · √(m + 1)', ...edition }, [
      ['I_k', fault.greatestKa, 'kA'],
      ['m', fault.decayShare, ''],
    ]),
    figure('devices.leastFaultKa', { value: fault.leastKa, unit: 'kA' }, { formula: 'c / 2 · U / Z', ...edition }, [
      ['c', fault.cMin, ''],
      ['U', nominalV, 'V'],
      ['Z', 1000 * fault.weakestOhm, 'mΩ'],
    ]),
  ];
}

function settingFigures(judged: Judged, bank: Bank): Figure[] {
  const bankA = bankCurrentA(bank, judged.site.nominalV);
  return [
    figure(
      'devices.instantaneousMinA',
      { value: INSTANTANEOUS_RATIO * bankA, unit: 'A' },
      { formula: 'k · I', source: PRACTICE },
      [
        ['k', INSTANTANEOUS_RATIO, ''],
        ['I', bankA, 'A'],
      ],
    ),
  ];
}

function heatFigures(heat: CabinetHeat): Figure[] {
  return [
    figure(
      'devices.cabinetHeatW',
      { value: heat.highW, unit: 'W' },
      { formula: 'q · Q_N + P_R + P_L', source: PRACTICE },
      [
        ['q', CAPACITOR_LOSS_W_PER_KVAR.high, 'W/kvar'],
        ['Q_N', heat.ratedKvar, 'kvar'],
        ['P_R', heat.resistorW, 'W'],
        ['P_L', heat.reactorW, 'W'],
      ],
    ),
    figure(
      'devices.airFlowM3PerH',
      { value: heat.airFlowM3PerH, unit: 'm³/h' },
      { formula: '3600 · P / (ρ · (1 − z / z_0)^n · c · ΔT)', source: 'derived' },
      [
        ['P', heat.highW, 'W'],
        ['ρ', AIR.densityKgPerM3, 'kg/m³'],
        ['z', heat.altitudeM, 'm'],
        ['z_0', AIR.scaleM, 'm'],
        ['n', AIR.exponent, ''],
        ['c', AIR.heatJPerKgK, 'J/(kg·K)'],
        ['ΔT', heat.allowedRiseK, 'K'],
      ],
    ),
  ];
}

function responseFigures(judged: Judged, bank: Bank, control: Control): Figure[] {
  const { nominalV, facts } = judged.site;
  const { currentTransformer } = facts;
  if (currentTransformer === null || bank.groups.every(({ fixed }) => fixed)) return [];
  return [
    figure(
      'devices.responseA',
      { value: responseA(bank, nominalV, control, currentTransformer), unit: 'A' },
      { formula: 'a · 1000 · q / (√(3) · U) · I_s / I_p', source: 'method, controller' },
      [
        ['a', control.responseRatio, ''],
        ['q', smallestKvar(bank, nominalV), 'kvar'],
        ['U', nominalV, 'V'],
        ['I_s', currentTransformer.ratioSecondaryA, 'A'],
        ['I_p', currentTransformer.ratioPrimaryA, 'A'],
      ],
    ),
  ];
}
