import { z } from 'zod';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { refused } from '../errors.ts';
import { emit } from '../events.ts';
import { allOf } from '../fake.ts';
import { flag, listInput, mergeMetadata, metadata, text } from '../input.ts';
import { paginate } from '../paginate.ts';
import { closeDispute, isOpen } from './dispute-progress.ts';

const evidence = z
  .strictObject({
    product_description: text,
    shipping_carrier: text,
    shipping_date: text,
    shipping_tracking_number: text,
    uncategorized_text: text,
  })
  .partial();

export const disputeEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/disputes/:id', {}, (call) => find(call, 'dispute', pathId(call))),
  endpoint(
    'GET',
    '/v1/disputes',
    { ...listInput, charge: text.optional(), payment_intent: text.optional() },
    (call) => {
      const { charge, payment_intent: intent } = call.input;
      const disputes = allOf(call.fake, 'dispute', call.owner).filter(
        (dispute) =>
          (charge === undefined || dispute.charge === charge) &&
          (intent === undefined || dispute.payment_intent === intent),
      );
      return paginate(disputes, call.input, '/v1/disputes');
    },
  ),
  endpoint(
    'POST',
    '/v1/disputes/:id',
    { evidence: evidence.optional(), metadata: metadata.optional(), submit: flag.optional() },
    (call) => {
      const dispute = find(call, 'dispute', pathId(call));
      if (!isOpen(dispute)) throw refused(`This dispute is ${dispute.status} and takes no evidence.`);
      Object.assign(dispute.evidence, call.input.evidence);
      dispute.metadata = mergeMetadata(dispute.metadata, call.input.metadata);
      if (call.input.evidence) dispute.evidence_details.has_evidence = true;
      // As the real service does, evidence is submitted unless the caller says not yet.
      if (call.input.evidence && call.input.submit !== false) {
        dispute.evidence_details.submission_count += 1;
        dispute.evidence_details.submission_method = 'manual';
        dispute.status = 'under_review';
      }
      emit(call.fake, call.owner, 'charge.dispute.updated', dispute, { request: call.request });
      return dispute;
    },
  ),
  endpoint('POST', '/v1/disputes/:id/close', {}, (call) => {
    const dispute = find(call, 'dispute', pathId(call));
    if (!closeDispute(call.fake, dispute, 'lost')) {
      throw refused(`This dispute is already ${dispute.status}.`);
    }
    return dispute;
  }),
];
