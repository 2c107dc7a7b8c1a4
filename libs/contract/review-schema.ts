import * as z from 'zod';
import { label, listOf, localDay, NOT_NEGATIVE, POSITIVE, quantity, whole } from './schema-parts.js';

const reason = label(2000).describe('why, in the words of whoever does it; never empty');

/** A signature's parts that nobody but the one who signs may fill in. */
const signed = {
  name: label(200).describe('of whoever signs, as it is to be printed'),
  licence: label(200).describe('kind and number of the licence; typed each time, never filled in'),
  jurisdiction: label(200).describe('where the licence holds; typed each time, never filled in'),
};

export const signatureSchema = z.strictObject(signed).meta({ id: 'Signature' });

/** Body of what sends a draft for review. */
export const submitSchema = z
  .strictObject({
    note: label(2000).optional().describe('what the reviewer should look at'),
    signature: signatureSchema.optional().describe('in the capacity of design'),
  })
  .meta({ id: 'SendForReview' });

export const acceptFindingSchema = z
  .strictObject({ finding: label(400).describe('its id, as the review lists it'), reason })
  .meta({ id: 'AcceptFinding' });

export const handCheckSchema = z
  .strictObject({
    figure: label(120).describe('id of a decisive figure'),
    value: z.number().min(-1e12).max(1e12).describe('worked out by hand, in the figure’s own unit'),
  })
  .meta({ id: 'HandCheck' });

export const commentSchema = z
  .strictObject({
    figure: label(120).optional().describe('id of the figure it is about; absent, the whole plan'),
    text: label(4000),
  })
  .meta({ id: 'Comment' });

/** Body of a return, a withdrawal, or the administrator’s leave. */
export const reasonSchema = z.strictObject({ reason }).meta({ id: 'Reason' });

export const supersedeSchema = z
  .strictObject({ by: whole(1, 1e9).describe('number of the approved revision that takes its place'), reason })
  .meta({ id: 'Supersede' });

export const approveSchema = z
  .strictObject({
    ...signed,
    password: z.string().max(1000).optional().describe('once more, where accounts exist'),
  })
  .meta({ id: 'Approve' });

const check = z.strictObject({
  passed: z.boolean(),
  note: label(500).optional().describe('what was measured or found'),
});

const distortion = z.strictObject({
  voltagePct: quantity('voltagePct', { min: 0, max: 100 }),
  currentPct: quantity('currentPct', { min: 0, max: 1000 }).optional(),
});

/** What was found when the bank was put into service: "as installed". */
export const commissioningSchema = z
  .strictObject({
    doneOn: localDay(),
    instrument: label(200).describe('what was measured with: kind, number, last calibration'),
    isolation: check.describe('isolation proved before work'),
    insulation: check.extend({ leastOhm: quantity('leastOhm', POSITIVE).optional() }),
    torque: check.describe('every bolted connection to its torque'),
    phaseRotation: check,
    currentTransformer: check.extend({
      ratio: label(40).describe('as fitted, such as "1500/5"'),
      phase: label(40).describe('the phase it sits on'),
    }),
    stages: listOf(
      z.strictObject({
        stage: whole(1, 200).describe('counts the physical stages from 1'),
        lineV: quantity('lineV', POSITIVE),
        currentsA: z.tuple([
          quantity('currentA', NOT_NEGATIVE),
          quantity('currentA', NOT_NEGATIVE),
          quantity('currentA', NOT_NEGATIVE),
        ]),
        dischargedToV: quantity('dischargedToV', NOT_NEGATIVE)
          .optional()
          .describe('voltage left at the end of the wait'),
        dischargedWithinS: quantity('dischargedWithinS', NOT_NEGATIVE).optional(),
      }),
      0,
      200,
    ),
    distortionBefore: distortion,
    distortionAfter: distortion,
    trips: listOf(z.strictObject({ name: label(120), operated: z.boolean(), note: label(500).optional() }), 0, 50),
    settings: listOf(z.strictObject({ name: label(120), value: label(120) }), 0, 200).describe('as left'),
    note: label(4000).optional(),
  })
  .meta({ id: 'CommissioningRecord' });

export type CommissioningRecord = z.output<typeof commissioningSchema>;

export const commissionSchema = z.strictObject({ ...signed, record: commissioningSchema }).meta({ id: 'Commission' });

/** Body of what computes a revision again. */
export const againSchema = z
  .strictObject({
    keep: z.boolean().optional().describe('make a further revision of it; absent, it is compared and thrown away'),
    author: label(200).optional(),
    reason: label(2000).optional(),
  })
  .meta({ id: 'ComputeAgain' });

export type SendForReview = z.output<typeof submitSchema>;
export type AcceptFinding = z.output<typeof acceptFindingSchema>;
export type HandCheckGiven = z.output<typeof handCheckSchema>;
export type Comment = z.output<typeof commentSchema>;
export type Reason = z.output<typeof reasonSchema>;
export type Supersede = z.output<typeof supersedeSchema>;
export type Approve = z.output<typeof approveSchema>;
export type Commission = z.output<typeof commissionSchema>;
export type ComputeAgain = z.output<typeof againSchema>;
