import type { Result } from '#libs/engine/index.js';
import { SIGNATURE_STATEMENTS } from '#libs/present/review-words.js';
import type { Capacity } from '#libs/review/review-act.js';
import { type Html, html } from '../home/html.js';

/** The route an act is sent to, and the version the page shows. */
export interface FormPlace {
  /** of the review: `/api/sites/…/review` */
  base: string;
  version: number;
}

/** The one filled button of a page: what it is there for. */
const MAIN_ACTS = ['submit', 'approve'];

/**
 * A form that sends one act.
 * @param place of the review
 * @param act last part of its route
 * @param button what the button says
 * @param fields between
 */
export function actForm({ base, version }: FormPlace, act: string, button: string, fields: Html | Html[]): Html {
  return html`<form data-act="${base}/${act}" data-seen="&quot;${version}&quot;">
${fields}
<p role="alert"></p><button class="${MAIN_ACTS.includes(act) ? '' : 'quiet'}">${button}</button></form>`;
}

/** A field for a line of text. */
export function textField(label: string, name: string, more: { long?: boolean; hint?: string } = {}): Html {
  const hint = more.hint ?? '';
  return more.long === true
    ? html`<label><span>${label}</span><textarea name="${name}" maxlength="4000" placeholder="${hint}"></textarea></label>`
    : html`<label><span>${label}</span><input name="${name}" maxlength="400" autocomplete="off" placeholder="${hint}"></label>`;
}

/** A field for a number in the unit the label names. */
export function numberField(label: string, name: string): Html {
  return html`<label><span>${label}</span><input name="${name}" type="number" step="any" data-number autocomplete="off"></label>`;
}

/** The statement of a signature, and the fields nobody but who signs may fill in. */
export function signatureFields(capacity: Capacity, prefix = ''): Html {
  return html`<fieldset><legend>Signature</legend><p>${SIGNATURE_STATEMENTS[capacity]}</p>
${textField('Name', `${prefix}name`)}${textField('Licence: kind and number', `${prefix}licence`)}${textField('Jurisdiction', `${prefix}jurisdiction`)}</fieldset>`;
}

const CHECKS: [label: string, name: string][] = [
  ['Isolation proved before work', 'isolation'],
  ['Insulation measured', 'insulation'],
  ['Every bolted connection to its torque', 'torque'],
  ['Phase rotation', 'phaseRotation'],
  ['Current transformer: place, phase and direction', 'currentTransformer'],
];

const AS_LEFT: [label: string, unit: string, read: (control: Result['control']) => string | number][] = [
  ['set point, power factor', '', (control) => control.setPointPowerFactor],
  ['response ratio', '', (control) => control.responseRatio],
  ['step delay', 's', (control) => control.stepDelayS],
  ['reconnection delay', 's', (control) => control.reconnectDelayS],
];

/** The commissioning record, with a row for each stage of the bank that was approved. */
export function commissioningForm(place: FormPlace, { bank, control }: Pick<Result, 'bank' | 'control'>): Html {
  const checks = CHECKS.map(
    ([label, name]) => html`<fieldset><legend>${label}</legend>
<label><input type="checkbox" name="record.${name}.passed"> passed</label>${textField('Measured or found', `record.${name}.note`)}
${name === 'currentTransformer' ? html`<div class="fields">${textField('Ratio as fitted', 'record.currentTransformer.ratio')}${textField('Phase it sits on', 'record.currentTransformer.phase')}</div>` : null}
${name === 'insulation' ? numberField('Least insulation resistance, Ω', 'record.insulation.leastOhm') : null}</fieldset>`,
  );
  const stages = bank.stages.map((stage, at) => stageFields(at, stage.ratedKvar, stage.ratedV));
  const settings = AS_LEFT.map(
    (
      [label, unit, read],
      at,
    ) => html`<label><span>${label}${unit === '' ? '' : `, ${unit}`}: planned ${read(control)}</span>
<input type="hidden" name="record.settings.${at}.name" value="${label}"><input name="record.settings.${at}.value" autocomplete="off"></label>`,
  );
  return actForm(place, 'commissioning', 'Record as installed', [
    html`<div class="fields">${textField('Date, as 2026-12-01', 'record.doneOn')}${textField('Instruments', 'record.instrument')}</div>`,
    ...checks,
    html`<fieldset><legend>Each stage alone: voltage, currents, discharge</legend>${stages}</fieldset>`,
    html`<fieldset><legend>Distortion</legend><div class="fields">${numberField('Voltage before, %', 'record.distortionBefore.voltagePct')}${numberField('Current before, %', 'record.distortionBefore.currentPct')}${numberField('Voltage after, %', 'record.distortionAfter.voltagePct')}${numberField('Current after, %', 'record.distortionAfter.currentPct')}</div></fieldset>`,
    html`<fieldset><legend>Trips proved</legend>${tripFields(0, 'overtemperature')}${tripFields(1, 'overcurrent')}${tripFields(2, 'overvoltage')}</fieldset>`,
    html`<fieldset><legend>Settings as left</legend>${settings}</fieldset>`,
    textField('Anything else', 'record.note', { long: true }),
    signatureFields('installation'),
  ]);
}

function stageFields(at: number, ratedKvar: number, ratedV: number): Html {
  const name = `record.stages.${at}`;
  return html`<p>Stage ${at + 1}, ${ratedKvar} kvar at ${ratedV} V</p><input type="hidden" data-number name="${name}.stage" value="${at + 1}">
<div class="fields">${numberField('Line voltage, V', `${name}.lineV`)}${numberField('L1, A', `${name}.currentsA.0`)}${numberField('L2, A', `${name}.currentsA.1`)}${numberField('L3, A', `${name}.currentsA.2`)}${numberField('Discharged to, V', `${name}.dischargedToV`)}${numberField('within, s', `${name}.dischargedWithinS`)}</div>`;
}

function tripFields(at: number, trip: string): Html {
  const name = `record.trips.${at}`;
  return html`<label><input type="hidden" name="${name}.name" value="${trip}"><input type="checkbox" name="${name}.operated"> ${trip} operated when it was proved</label>`;
}
