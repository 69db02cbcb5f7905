import { z } from 'zod';
import { line, moment, paragraph, rowVersion } from './fields';

const remark = paragraph(2000, 'Say why in a few words.');
/** Keys are the parameters of the device, values what it shows. */
const values = z.record(
  line(8),
  z.union([z.number(), z.literal('inf').transform(() => Infinity)], {
    error: 'Give the number that the device shows, or "inf".',
  }),
);

const content = z.object({
  reason: remark,
  risk: paragraph(2000).default(''),
  test: paragraph(4000).default(''),
  wayBack: paragraph(4000).default(''),
  temporaryUntil: moment.optional(),
  safetyFunction: z.enum(['no', 'yes', 'unknown'], { error: 'Answer no, yes or unknown.' }),
  siteReference: line(200).default(''),
});

export const createChangeInput = content.extend({ axisId: z.uuid(), gainSetId: z.uuid() });
export const updateChangeInput = content.extend({ rowVersion });

export const approveInput = z.object({
  password: z.string().min(1, 'Type your password to sign.').max(1000),
  /** The hash of the content that was read; given, nothing else can be signed. */
  hash: z.string().max(64).optional(),
});
export const remarkInput = z.object({ remark });
export const issueInput = z.object({ technicianId: z.uuid().optional() });

export const applyInput = z.object({
  cautionsAcknowledged: z.literal(true, { error: 'The cautions must be acknowledged first.' }),
  identity: z.object({
    deviceLabel: line(120, 'Type the label that stands on the device.'),
    slot: line(60).optional(),
    firmware: line(60).optional(),
  }),
  asFound: values,
  asLeft: values,
  saved: z.enum(['yes', 'not-applicable'], { error: 'Say whether the values are saved in the device.' }),
  asFoundRemark: paragraph(2000).optional(),
  remark: paragraph(2000).optional(),
  /** When it was written down, by the clock of the device it was written on; it may be sent later. */
  enteredAt: moment.optional(),
});

export const verifyInput = z.object({
  recordId: z.uuid().optional(),
  result: z.enum(['pass', 'fail'], { error: 'The result is pass or fail.' }),
  remark: paragraph(2000).optional(),
  enteredAt: moment.optional(),
});

export const rollBackInput = z.object({ reason: remark, asLeft: values, enteredAt: moment.optional() });

export type ApplyInput = z.output<typeof applyInput>;
