import type Stripe from 'stripe';
import { moveOutside } from '../balances.ts';
import { outside } from '../books.ts';
import { emit } from '../events.ts';
import { idOf, keep, mustFind, newId, now, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';

/** What a dispute costs the platform beside the sum itself; it is not given back. */
const disputeFee = 1500;
const answerSeconds = 9 * 24 * 60 * 60;

function noEvidence(): Stripe.Dispute.Evidence {
  return {
    access_activity_log: null,
    billing_address: null,
    cancellation_policy: null,
    cancellation_policy_disclosure: null,
    cancellation_rebuttal: null,
    customer_communication: null,
    customer_email_address: null,
    customer_name: null,
    customer_purchase_ip: null,
    customer_signature: null,
    duplicate_charge_documentation: null,
    duplicate_charge_explanation: null,
    duplicate_charge_id: null,
    enhanced_evidence: {},
    product_description: null,
    receipt: null,
    refund_policy: null,
    refund_policy_disclosure: null,
    refund_refusal_explanation: null,
    service_date: null,
    service_documentation: null,
    shipping_address: null,
    shipping_carrier: null,
    shipping_date: null,
    shipping_documentation: null,
    shipping_tracking_number: null,
    uncategorized_file: null,
    uncategorized_text: null,
  };
}

function moveFunds(fake: Fake, dispute: Stripe.Dispute, amount: number, fee: number): void {
  const entry = moveOutside(fake, {
    owner: platform,
    counterpart: outside.cards,
    amount,
    fee,
    currency: dispute.currency,
    type: 'adjustment',
    category: amount < 0 ? 'dispute' : 'dispute_reversal',
    source: dispute.id,
    description: amount < 0 ? 'Chargeback withdrawal' : 'Chargeback reversal',
    availableOn: now(fake),
  });
  dispute.balance_transactions.push(entry);
}

/** The buyer disputes a charge: sum and fee leave the platform at once. Null when it cannot be disputed. */
export function openDispute(fake: Fake, charge: Stripe.Charge, reason: string): Stripe.Dispute | null {
  const rest = charge.amount - charge.amount_refunded;
  if (charge.disputed || !charge.paid || charge.payment_intent === null || rest === 0) return null;
  const dispute: Stripe.Dispute = {
    id: newId('dp'),
    object: 'dispute',
    amount: rest,
    balance_transactions: [],
    charge: charge.id,
    created: now(fake),
    currency: charge.currency,
    enhanced_eligibility_types: [],
    evidence: noEvidence(),
    evidence_details: {
      due_by: now(fake) + answerSeconds,
      enhanced_eligibility: {},
      has_evidence: false,
      past_due: false,
      submission_count: 0,
      submission_method: 'not_submitted',
    },
    intended_submission_method: null,
    is_charge_refundable: false,
    livemode: false,
    metadata: {},
    payment_intent: charge.payment_intent,
    reason,
    status: 'needs_response',
  };
  keep(fake, platform, dispute);
  charge.disputed = true;
  emit(fake, platform, 'charge.dispute.created', dispute);
  moveFunds(fake, dispute, -rest, disputeFee);
  emit(fake, platform, 'charge.dispute.funds_withdrawn', dispute);
  return dispute;
}

export function isOpen(dispute: Stripe.Dispute): boolean {
  return dispute.status === 'needs_response' || dispute.status === 'under_review';
}

/** Ends a dispute; a won one brings the sum back, never the fee. */
export function closeDispute(fake: Fake, dispute: Stripe.Dispute, outcome: 'won' | 'lost'): boolean {
  if (!isOpen(dispute)) return false;
  dispute.status = outcome;
  if (outcome === 'won') {
    mustFind(fake, 'charge', idOf(dispute.charge) ?? '').disputed = false;
    moveFunds(fake, dispute, dispute.amount, 0);
    emit(fake, platform, 'charge.dispute.funds_reinstated', dispute);
  }
  emit(fake, platform, 'charge.dispute.closed', dispute);
  fake.store.touch();
  return true;
}
