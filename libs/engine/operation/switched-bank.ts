import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';

/** Stages of equal size, seen by the controller. */
export interface SizeClass {
  kvar: number;
  /** indices of the physical stages, ascending */
  stages: Int32Array;
}

/** A bank as its controller sees it: switchable stages by size, largest first, and what is always in. */
export interface SwitchedBank {
  /** all physical stages, switched or not */
  stageCount: number;
  /** switchable stages by size, largest first */
  classes: SizeClass[];
  /** kvar of the stages that are never switched */
  fixedKvar: number;
  /** smallest switchable stage [kvar]; 0 where there is none */
  smallestKvar: number;
}

/** Stages whose effective kvar differ by no more than this are one size. */
const SAME_SIZE = 1e-9;

/**
 * Sorts a bank's stages into size classes (equal effective kvar within 1e-9 relative).
 * @param bank the bank
 * @param nominalV bus voltage [V]
 * @returns the controller's view
 * @source method-bank
 */
export function switchedBank(bank: Bank, nominalV: number): SwitchedBank {
  const classes: { kvar: number; stages: number[] }[] = [];
  let fixedKvar = 0;
  let index = 0;
  for (const group of bank.groups) {
    const kvar = effectiveKvar(group, nominalV);
    if (group.fixed) {
      fixedKvar += group.count * kvar;
      index += group.count;
      continue;
    }
    let sizeClass = classes.find((known) => Math.abs(known.kvar - kvar) <= SAME_SIZE * kvar);
    if (sizeClass === undefined) {
      sizeClass = { kvar, stages: [] };
      classes.push(sizeClass);
    }
    for (let stage = 0; stage < group.count; stage++) sizeClass.stages.push(index++);
  }
  classes.sort((a, b) => b.kvar - a.kvar);
  return {
    stageCount: index,
    classes: classes.map(({ kvar, stages }) => ({ kvar, stages: Int32Array.from(stages) })),
    fixedKvar,
    smallestKvar: classes.length === 0 ? 0 : classes[classes.length - 1]!.kvar,
  };
}
