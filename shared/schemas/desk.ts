import { z } from 'zod';
import { decimalString, instant, lotCode, quantitySchema } from './common.ts';
import {
  contentAnswer,
  EVIDENCE_GRADE_VALUES,
  lotEventAnswer,
  photoAnswer,
  SAMPLING_VALUES,
} from './lots.ts';

export const laboratoryAnswer = z.object({
  id: z.uuid(),
  name: z.string(),
  accreditationBody: z.string(),
  accreditationNumber: z.string(),
  scope: z.string(),
  region: z.string(),
  /** For staff only; empty for others. */
  contact: z.string(),
  validUntil: z.iso.date(),
  isActive: z.boolean(),
});
export type LaboratoryAnswer = z.infer<typeof laboratoryAnswer>;
export const laboratoriesAnswer = z.object({ laboratories: z.array(laboratoryAnswer) });

export const laboratoryRequest = z.object({
  name: z.string().trim().min(2, 'Write the laboratory’s name').max(120),
  accreditationBody: z.string().trim().min(2, 'Write who accredits it').max(120),
  accreditationNumber: z.string().trim().min(1, 'Write its accreditation number').max(60),
  scope: z.string().trim().min(3, 'Write the scope: metals and methods').max(500),
  region: z.string().trim().min(2, 'Write its region').max(60),
  contact: z.string().trim().min(3, 'Write how the desk reaches it').max(254),
  validUntil: z.iso.date('Write a date such as 2027-12-31'),
  isActive: z.boolean().default(true),
});
export type LaboratoryRequest = z.infer<typeof laboratoryRequest>;

export const queueRow = z.object({
  id: z.uuid(),
  lotCode,
  lotTitle: z.string(),
  form: z.string(),
  laboratoryName: z.string(),
  number: z.string(),
  submittedAt: instant,
  state: z.enum(['submitted', 'claimed', 'verified', 'examined', 'returned', 'superseded']),
  claimedBy: z.string().nullable(),
  isMine: z.boolean(),
  flags: z.number().int(),
  can: z.object({ claim: z.boolean(), open: z.boolean() }),
});
export type QueueRow = z.infer<typeof queueRow>;
export const queueAnswer = z.object({ waiting: z.array(queueRow), decided: z.array(queueRow) });
export type QueueAnswer = z.infer<typeof queueAnswer>;

/** One comparison between the report's figure and the lot's. `differs` marks what the desk must look at. */
export const comparisonRow = z.object({
  label: z.string(),
  onReport: z.string(),
  onLot: z.string(),
  differs: z.boolean(),
  /** The machine cannot compare this line: a person must look. */
  isByEye: z.boolean(),
  note: z.string().nullable(),
});

export const caseFlag = z.object({
  code: z.enum([
    'number-seen-before',
    'file-seen-before',
    'photo-seen-before',
    'fractions-over-whole',
    'outside-method-range',
    'laboratory-unknown',
    'accreditation-expired',
    'method-surface-only',
    'issued-in-future',
    'not-sampled-by-laboratory',
    'no-mass-nor-mark',
  ]),
  message: z.string(),
  lotCode: z.string().nullable(),
});

export const caseAnswer = z.object({
  id: z.uuid(),
  version: z.number().int(),
  state: queueRow.shape.state,
  claimedBy: z.string().nullable(),
  submittedAt: instant,
  document: z.object({ url: z.string(), mediaType: z.string(), name: z.string() }),
  report: z.object({
    laboratoryName: z.string(),
    laboratory: laboratoryAnswer.nullable(),
    number: z.string(),
    issuedOn: z.iso.date(),
    receivedOn: z.string().nullable(),
    testedOn: z.string().nullable(),
    sampling: z.enum(SAMPLING_VALUES),
    itemDescription: z.string(),
    itemMass: quantitySchema.nullable(),
    itemMark: z.string().nullable(),
    authorisedBy: z.string(),
    results: z.array(
      z.object({
        element: z.string(),
        finenessPermille: decimalString,
        uncertaintyPermille: decimalString.nullable(),
        method: z.string(),
      }),
    ),
  }),
  lot: z.object({
    code: lotCode,
    title: z.string(),
    description: z.string(),
    form: z.string(),
    gross: quantitySchema,
    contents: z.array(contentAnswer),
    photos: z.array(photoAnswer),
    history: z.array(lotEventAnswer),
    state: z.string(),
  }),
  seller: z.object({
    id: z.uuid(),
    displayName: z.string(),
    region: z.string(),
    completedDeals: z.number().int(),
    suspendedAt: instant.nullable(),
  }),
  comparison: z.array(comparisonRow),
  flags: z.array(caseFlag),
  /** The grade that verification would give, and what stands in the way of a better one. */
  proposedGrade: z.enum(EVIDENCE_GRADE_VALUES),
  gaps: z.array(z.string()),
  decision: z
    .object({
      by: z.string(),
      at: instant,
      grade: z.enum(EVIDENCE_GRADE_VALUES).nullable(),
      confirmedHow: z.string().nullable(),
      confirmedWith: z.string().nullable(),
      confirmedOn: z.string().nullable(),
      returnReason: z.string().nullable(),
    })
    .nullable(),
  can: z.object({
    claim: z.boolean(),
    release: z.boolean(),
    verify: z.boolean(),
    examine: z.boolean(),
    return: z.boolean(),
    pull: z.boolean(),
    suspend: z.boolean(),
  }),
});
export type CaseAnswer = z.infer<typeof caseAnswer>;

export const verifyRequest = z.object({
  version: z.number().int(),
  laboratoryId: z.uuid('Choose the laboratory from the register'),
  confirmedHow: z
    .string()
    .trim()
    .min(5, 'Say how it was confirmed, such as by telephone or on the laboratory’s page')
    .max(500),
  confirmedWith: z.string().trim().min(2, 'Say with whom it was confirmed').max(200),
  confirmedOn: z.iso.date('Write a date such as 2026-11-30'),
  /** The mark that the report names is seen on the lot's photos; said by the desk, never inferred. */
  isMarkSeen: z.boolean().default(false),
});
export type VerifyRequest = z.infer<typeof verifyRequest>;

export const examineRequest = z.object({
  version: z.number().int(),
  note: z.string().trim().min(5, 'Say what was looked at').max(500),
});
export type ExamineRequest = z.infer<typeof examineRequest>;
export const returnRequest = z.object({
  version: z.number().int(),
  reason: z.string().trim().min(10, 'Give the seller a reason in a sentence').max(1000),
});
export type ReturnRequest = z.infer<typeof returnRequest>;

export const suspendRequest = z.object({
  reason: z.string().trim().min(10, 'Give a reason in a sentence').max(500),
});

export const auditQuery = z.object({
  before: instant.optional(),
  limit: z.coerce.number().int().min(1).max(100).default(50),
});

export const auditRow = z.object({
  at: instant,
  who: z.string(),
  role: z.string(),
  act: z.string(),
  subject: z.string(),
  detail: z.record(z.string(), z.unknown()),
});
export const auditAnswer = z.object({ rows: z.array(auditRow), nextBefore: instant.nullable() });
export type AuditAnswer = z.infer<typeof auditAnswer>;

export const deskDealsAnswer = z.object({
  contested: z.array(
    z.object({
      code: z.string(),
      lotTitle: z.string(),
      reason: z.string(),
      contestedAt: instant,
      decideBy: instant,
      total: z.string(),
      isOwn: z.boolean(),
    }),
  ),
  /** Delivered, and the buyer's days to inspect have passed without a word; the longest first. */
  overdue: z.array(
    z.object({
      code: z.string(),
      lotTitle: z.string(),
      deliveredAt: instant,
      inspectBy: instant,
      total: z.string(),
      isOwn: z.boolean(),
    }),
  ),
});
export type DeskDealsAnswer = z.infer<typeof deskDealsAnswer>;

export const deskMemberAnswer = z.object({
  id: z.uuid(),
  displayName: z.string(),
  region: z.string(),
  role: z.string(),
  suspendedAt: instant.nullable(),
  suspensionReason: z.string().nullable(),
  can: z.object({ suspend: z.boolean(), reinstate: z.boolean() }),
});
export type DeskMemberAnswer = z.infer<typeof deskMemberAnswer>;
/** A part of the name, or a whole e-mail address; nothing typed lists who is suspended. */
export const deskMembersQuery = z.object({ query: z.string().trim().max(254).default('') });
export const deskMembersAnswer = z.object({ members: z.array(deskMemberAnswer) });
