import { z } from 'zod';

const text = (most: number) => z.string().trim().max(most);
const remark = text(2000).min(1, 'Say why in a few words.');
/** Keys are the parameters of the device, values what it shows. */
const values = z.record(z.string().max(8), z.number());

const content = z.object({
  reason: remark,
  risk: text(2000).default(''),
  test: text(4000).default(''),
  wayBack: text(4000).default(''),
  temporaryUntil: z.iso
    .datetime({ offset: true, error: 'Give date and time as 2026-12-24T18:00:00Z.' })
    .optional(),
  safetyFunction: z.enum(['no', 'yes', 'unknown'], { error: 'Answer no, yes or unknown.' }),
  siteReference: text(200).default(''),
});

export const createChangeInput = content.extend({ axisId: z.uuid(), gainSetId: z.uuid() });
export const updateChangeInput = content.extend({ rowVersion: z.int().min(1) });

export const approveInput = z.object({
  password: z.string().min(1, 'Type your password to sign.').max(1000),
});
export const remarkInput = z.object({ remark });
export const issueInput = z.object({ technicianId: z.uuid().optional() });

export const applyInput = z.object({
  cautionsAcknowledged: z.literal(true, { error: 'The cautions must be acknowledged first.' }),
  identity: z.object({
    deviceLabel: text(120).min(1, 'Type the label that stands on the device.'),
    slot: text(60).optional(),
    firmware: text(60).optional(),
  }),
  asFound: values,
  asLeft: values,
  saved: z.enum(['yes', 'not-applicable'], { error: 'Say whether the values are saved in the device.' }),
  asFoundRemark: text(2000).optional(),
  remark: text(2000).optional(),
});

export const verifyInput = z.object({
  recordId: z.uuid().optional(),
  result: z.enum(['pass', 'fail'], { error: 'The result is pass or fail.' }),
  remark: text(2000).optional(),
});

export const rollBackInput = z.object({ reason: remark, asLeft: values });

export type ApplyInput = z.output<typeof applyInput>;
