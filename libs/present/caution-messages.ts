import type { Messages } from './message.js';

const level = 'information';
const consequence = '';

/** The cautions every plan carries, in our own words. */
export const CAUTION_MESSAGES: Messages = {
  'caution.storedCharge': {
    level,
    consequence,
    text:
      'Danger: a capacitor keeps its charge after it is cut off. Switch off and secure against switching on; wait the time ' +
      'printed for that stage, {waitS} at the longest by the standard’s resistor to {toV}; prove dead between every pair of ' +
      'terminals and to earth; discharge, short and earth before touching. A discharge resistor may have failed, so the wait ' +
      'alone proves nothing.',
  },
  'caution.qualifiedPeople': {
    level,
    consequence,
    text: 'Work on the bank and its supply is for qualified people only, working to a written procedure of the site.',
  },
  'caution.currentTransformer': {
    level,
    consequence,
    text:
      'Danger: never open the secondary of a current transformer while its primary carries current; short it first. ' +
      'An open secondary can kill and can burn the transformer.',
  },
  'caution.inrush': {
    level,
    consequence,
    text:
      'A stage switched in while still charged, or onto stages already connected, draws a current far above its rating. ' +
      'Let the reconnection delay run out each time, by hand as well.',
  },
  'caution.resonance': {
    level,
    consequence,
    text:
      'Capacitors and the supply resonate. Other capacitors, cables, drives or a changed supply, now or later, move the ' +
      'resonance: judge the bank again before any of them is added.',
  },
  'caution.overCorrection': {
    level,
    consequence,
    text:
      'Too many stages at light load raise the voltage and make the current lead. Keep the bank off while a generator ' +
      'carries the site, unless its maker agrees in writing.',
  },
  'caution.temperature': {
    level,
    consequence,
    text:
      'Heat ages capacitors and can set them on fire. Keep to their ambient category, keep the air paths free, and look for ' +
      'swelling, leakage and dark spots at every inspection.',
  },
  'caution.faultLevel': {
    level,
    consequence,
    text:
      'The fault level printed here is for resonance only. Short-time withstand and breaking capacity need the greatest ' +
      'fault current by its own standard, with voltage factor and motor contribution.',
  },
  'caution.earthing': {
    level,
    consequence,
    text: 'Earth the frame and the enclosure. Do not earth the star point of a capacitor unless the network was designed for it.',
  },
  'caution.dataGiven': {
    level,
    consequence,
    text: 'This plan is as good as the data it was given. Check nameplates, fault levels and loads on site before relying on it.',
  },
  'caution.localCodes': {
    level,
    consequence,
    text: 'Local codes and the judgement of the licensed practitioner prevail over anything printed here.',
  },
  'caution.notPermission': {
    level,
    consequence,
    text: 'That no computed limit was passed is not permission to energise.',
  },
};
