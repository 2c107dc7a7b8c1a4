/** Something to look for on the visit. */
export interface SurveyLook {
  look: string;
  /** field of the site file it settles */
  path?: string;
  unit?: string;
  isPhotograph?: boolean;
}

const photograph = (look: string): SurveyLook => ({ look, isPhotograph: true });

/** The visit, from the transformer to the meter. */
export const surveyParts: readonly { what: string; looks: readonly SurveyLook[] }[] = [
  {
    what: 'Transformer plate',
    looks: [
      { look: 'rated power', path: 'supply.transformers[0].ratedKva', unit: 'kVA' },
      { look: 'impedance', path: 'supply.transformers[0].impedancePct', unit: '%' },
      { look: 'load loss, taps and the one in use', path: 'supply.transformers[0].loadLossKw', unit: 'kW' },
      photograph('photograph of the plate'),
    ],
  },
  {
    what: 'Main board',
    looks: [
      { look: 'nominal voltage, and the highest by the meter', path: 'bus.nominalV', unit: 'V' },
      { look: 'free breaker way: rating, where, free width' },
      { look: 'breaking capacity of the board', path: 'bank.mainDevice.breakingKa', unit: 'kA' },
      photograph('photograph of the front, and of the free way'),
    ],
  },
  {
    what: 'Current transformer',
    looks: [
      { look: 'ratio and class', path: 'control.currentTransformer.ratioPrimaryA', unit: 'A' },
      { look: 'where: does it see the loads and the bank’s branch?', path: 'control.currentTransformer.place' },
      { look: 'phase and direction', path: 'control.currentTransformer.phase' },
    ],
  },
  {
    what: 'Old bank',
    looks: [
      { look: 'in or out, since when', path: 'recordedBank.state' },
      { look: 'plates of stages and reactors, what the controller shows' },
      photograph('photographs of the plates'),
    ],
  },
  {
    what: 'Loads',
    looks: [
      { look: 'drives and rectifiers: current, kind, choke' },
      { look: 'largest motors, welders, furnaces, lighting' },
      photograph('photographs of the largest drives’ plates'),
    ],
  },
  {
    what: 'Room and route',
    looks: [
      { look: 'free width, depth, height, and in front of it' },
      { look: 'warmest air, dust, water', path: 'place.ambientMaxC', unit: '°C' },
      { look: 'cable route and length to the board' },
      photograph('photograph of the place and of the route'),
    ],
  },
  {
    what: 'Meter and bill',
    looks: [
      { look: 'where it stands: bus or primary', path: 'meteredAt' },
      { look: 'how interval data can be had, for which months' },
      { look: 'a year of bills, with the clause on reactive energy' },
    ],
  },
];
