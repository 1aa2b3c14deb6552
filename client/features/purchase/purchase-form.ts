import { purchaseRequest, type PurchaseRequest } from '#shared/schemas/deals.ts';
import type { FieldProblem } from '../../lib/api-client.ts';

export const ADDRESS_FIELDS = [
  'name',
  'line1',
  'line2',
  'postcode',
  'city',
  'region',
  'country',
  'phone',
] as const;
export type AddressField = (typeof ADDRESS_FIELDS)[number];

export type PurchaseForm = {
  delivery: Record<AddressField, string>;
  confirmsAge: boolean;
  confirmsRules: boolean;
};

export function blankPurchase(country: string): PurchaseForm {
  const delivery = Object.fromEntries(ADDRESS_FIELDS.map((field) => [field, ''])) as PurchaseForm['delivery'];
  return { delivery: { ...delivery, country }, confirmsAge: false, confirmsRules: false };
}

/** Whether something kept from before is still a form of this shape. */
export function isPurchaseForm(value: unknown): value is PurchaseForm {
  if (typeof value !== 'object' || value === null) return false;
  const { delivery, confirmsAge, confirmsRules } = value as Partial<PurchaseForm>;
  return (
    typeof delivery === 'object' &&
    delivery !== null &&
    ADDRESS_FIELDS.every((field) => typeof delivery[field] === 'string') &&
    typeof confirmsAge === 'boolean' &&
    typeof confirmsRules === 'boolean'
  );
}

/** Errors by the id of their field, in the order of the form. */
export type FieldErrors = Record<string, string>;

/** '/delivery/line1' stands in the page as 'delivery-line1'. */
export function fieldIdOf(pointer: string): string {
  return pointer.replace(/^\//, '').replaceAll('/', '-');
}

/** The request, or what is wrong with it, by the same schema that the server reads it with. */
export function readPurchase(
  form: PurchaseForm,
  total: string,
): { request: PurchaseRequest; errors: null } | { request: null; errors: FieldErrors } {
  const parsed = purchaseRequest.safeParse({ ...form, total });
  if (parsed.success) return { request: parsed.data, errors: null };
  const messages = new Map<string, string>();
  for (const issue of [...parsed.error.issues].reverse()) messages.set(issue.path.join('-'), issue.message);
  if (form.delivery.country === '') messages.set('delivery-country', 'Choose the country');
  const order = [...ADDRESS_FIELDS.map((field) => `delivery-${field}`), 'confirmsAge', 'confirmsRules'];
  const errors: FieldErrors = {};
  for (const id of [...order, ...messages.keys()]) {
    const message = messages.get(id);
    if (message) errors[id] = message;
  }
  return { request: null, errors };
}

export function fieldErrorsOf(problems: readonly FieldProblem[]): FieldErrors {
  const errors: FieldErrors = {};
  for (const { pointer, message } of problems) errors[fieldIdOf(pointer)] ??= message;
  return errors;
}
