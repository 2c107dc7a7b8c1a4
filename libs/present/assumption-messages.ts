import type { Messages } from './message.js';

/** An assumption is noted, and names what settles it. */
function assumed(text: string, consequence: string): Messages[string] {
  return { level: 'to be noted', text, consequence };
}

/** What was taken where the site file gave nothing. */
export const ASSUMPTION_MESSAGES: Messages = {
  'default.bus.highestV': assumed('The bus reaches {value} at the highest.', 'Read the voltage at light load.'),
  'default.target.powerFactor': assumed('The target power factor is {value}.', 'Read the tariff.'),
  'default.target.onExport': assumed(
    'While the site exports, the target asks for no kvar ({value}).',
    'Read the tariff’s clause on export.',
  ),
  'default.limits.emcClass': assumed('The bus is judged by class {value}.', 'Ask who owns the point of coupling.'),
  'default.recordedBank': assumed(
    'No bank was working while the record was taken.',
    'Ask the site; with an old bank in, the load’s own kvar are larger.',
  ),
  'default.supply.faultLevelMva.min': assumed(
    'The least fault level is {value}, the same as the greatest.',
    'Ask the network operator; a weaker supply moves the resonance down.',
  ),
  'default.supply.rOverX': assumed('R/X of the supply is {value}.', 'Ask the network operator.'),
  'default.supply.resistanceExponent': assumed(
    'Resistances grow with the order to the power of {value}.',
    'It moves the height of a resonance, not its place.',
  ),
  'default.supply.transformers.impedanceTolerancePct': assumed(
    'The transformer’s impedance may differ by {value} from its nameplate.',
    'Use the test certificate.',
  ),
  'default.supply.transformers.loadLossKw': assumed(
    'The transformer’s load loss is taken as {value}.',
    'Read the test certificate.',
  ),
  'default.supply.transformers.noLoadLossKw': assumed(
    'The transformer’s no-load loss is taken as {value}.',
    'Read the test certificate.',
  ),
  'default.supply.transformers.noLoadCurrentPct': assumed(
    'The transformer’s no-load current is taken as {value}.',
    'Read the test certificate; metered at the primary it adds to the need.',
  ),
  'supply.noTransformer': assumed(
    'No transformer was given: the fault level is taken to be the bus’s own.',
    'Give the transformer, if the fault level is the network’s.',
  ),
  'default.loads.dampingKw.max': assumed(
    'The load that damps a resonance is {value} at the most, the mean load of the record.',
    'It lowers the peaks of the nominal case; the corners take 0 as well.',
  ),
  'loads.dampingListed': assumed(
    'What damps a resonance are the motors and resistive loads listed in the network, and nothing beside them.',
    'Give the load at the bank’s bus that is not among them; the corners leave all of it out as well.',
  ),
  'default.loads.dampingKw.min': assumed(
    'The load that damps a resonance may fall to {value}.',
    'The severe end; nothing to settle.',
  ),
  'default.loads.motorSharePct': assumed('Motors make up {value} of the damping load.', 'List the motors.'),
  'default.loads.summation': assumed(
    'Harmonics of several loads add by {value}.',
    'The arithmetic sum is the severe end.',
  ),
  'measured.fitted': assumed(
    'The currents of the distorting loads at order {orderH} are taken {factor} times as stated, so that the model meets the reading to {residualPct}.',
    'They are those of the hour of the reading: ask at what load of the plant it was taken, and whether every load was on.',
  ),
  'measured.keptOrders': assumed(
    'Nothing was read at the orders {orders}: their currents are as stated.',
    'Read them too, or compare with the data sheets of the loads.',
  ),
  'network.besideNotSimulated': assumed(
    '{name} at {bus} is judged at every number of its stages that may be in. How it is switched is not simulated: what it gave while the record was taken stays in the record. The voltage and current of its capacitors are judged beside this bank; its own switchings, closings, discharge, devices and settings are not.',
    'Judge it as the site’s bank too, with this one among the banks of its network.',
  ),
  'network.cables.steady': assumed(
    'Cables keep the resistance they have at the fundamental at every order: their skin effect is small, and damping less is the severe end.',
    'Nothing to settle; the resistance of a warm cable is higher still.',
  ),
  'loads.distorting.none': assumed(
    'It was declared that no load distorts.',
    'Walk the site: drives, rectifiers, welders, lighting.',
  ),
  'loads.backgroundPct.none': assumed(
    'It was declared that the supply is free of distortion.',
    'Measure with the plant off, or ask the network operator.',
  ),
  'default.control.setPointPowerFactor': assumed('The controller steers to {value}.', 'Set it on the controller.'),
  'default.control.mode': assumed('The controller works by {value}.', 'Read its manual.'),
  'default.control.responseRatio': assumed(
    'A stage is switched when the deviation passes {value} of the smallest stage.',
    'Set it on the controller.',
  ),
  'default.control.stepDelayS': assumed('At least {value} pass between two switchings.', 'Set it on the controller.'),
  'default.control.reconnectDelayS': assumed(
    'A stage stays off for at least {value}, the time its discharge resistor takes to 10 %.',
    'Set it on the controller; a shorter one needs another resistor.',
  ),
  'default.control.wear': assumed('Equal stages are used by turns ({value}).', 'Set it on the controller.'),
  'default.bank.interStageUh': assumed(
    '{value} lie between two stages, as is customary.',
    'Measure the connections; it sets the inrush current.',
  ),
  'default.bank.stages.reactorQuality': assumed(
    'X/R of the reactors is {value} at the fundamental, as is customary.',
    'Read the reactor’s data sheet.',
  ),
  'default.catalogue.stageKvar': assumed(
    'Stages come in the common preferred sizes, 5 to 100 kvar.',
    'List what can be bought.',
  ),
  'default.catalogue.ratedV': assumed(
    'Capacitors come for the common voltages, 230 to 800 V.',
    'List what can be bought.',
  ),
  'default.catalogue.reactorPct': assumed('Reactor ratios are 0, 5.67, 7 or 14 %.', 'List what can be bought.'),
  'default.catalogue.maxStages': assumed('A bank has at most 12 stages.', 'Say how many ways the controller has.'),
  'understood.value': {
    level: 'information',
    text: '{given} was read as {value}.',
    consequence: 'Correct it if something else was meant.',
  },
  'default.limits.point': assumed(
    'The voltage at the bus is held against the limits, and the bus is taken for the point of coupling.',
    'Ask who owns the point of coupling, and where it lies.',
  ),
  'loads.angles': assumed(
    'The currents of {count} loads with angles add as phasors at every load and level; what cancels does so always.',
    'Leave the angles out where the loads do not run together, or their angles move with the load.',
  ),
  'limits.tighterCopy': assumed(
    'Copies of {edition} differ at order {orderH}, {usedPct} and {otherPct}: the tighter is used.',
    'Read the standard itself.',
  ),
  'bank.ignored': assumed(
    'The site’s own bank lends nothing to this plan.',
    'Judge it for itself, or say what was connected while the record was taken.',
  ),
  'money.unused': assumed(
    'Given and not used: {name}.',
    'It counts once a tariff, prices and sizes of stages stand beside it.',
  ),
};
