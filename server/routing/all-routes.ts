import { auditRoutes } from '#server/features/audit/audit-routes.ts';
import { caseRoutes } from '#server/features/desk/case-routes.ts';
import { dealRoutes } from '#server/features/deals/deal-routes.ts';
import { deskDealRoutes } from '#server/features/deals/desk-deal-routes.ts';
import { deskMemberRoutes } from '#server/features/desk/desk-member-routes.ts';
import { laboratoryRoutes } from '#server/features/laboratories/laboratory-routes.ts';
import { quoteRoutes } from '#server/features/quotes/quote-routes.ts';
import { sessionRoutes } from '#server/features/members/session-routes.ts';
import { onboardingRoutes } from '#server/features/onboarding/onboarding-routes.ts';
import { paymentRoutes } from '#server/features/payments/payment-routes.ts';
import { webhookRoutes } from '#server/features/provider-events/webhook-routes.ts';
import { feeRoutes } from '#server/features/fees/fee-routes.ts';
import { documentRoutes } from '#server/features/lot-documents/document-routes.ts';
import { lotRoutes } from '#server/features/lots/lot-routes.ts';
import { mailRoutes } from '#server/features/mails/mail-routes.ts';
import { priceFixRoutes } from '#server/features/price-fixes/price-fix-routes.ts';
import { photoRoutes } from '#server/features/photos/photo-routes.ts';
import { receiptRoutes } from '#server/features/receipts/receipt-routes.ts';
import { registerRoutes } from '#server/features/register/register-routes.ts';
import { valuationRoutes } from '#server/features/valuations/valuation-routes.ts';
import { describeApi } from './api-description.ts';
import { defineRoute, type RouteDefinition } from './define-route.ts';

const productRoutes: readonly RouteDefinition[] = [
  ...sessionRoutes,
  ...quoteRoutes,
  ...dealRoutes,
  ...receiptRoutes,
  ...deskDealRoutes,
  ...laboratoryRoutes,
  ...caseRoutes,
  ...deskMemberRoutes,
  ...auditRoutes,
  ...mailRoutes,
  ...onboardingRoutes,
  ...paymentRoutes,
  ...webhookRoutes,
  ...registerRoutes,
  ...feeRoutes,
  ...lotRoutes,
  ...priceFixRoutes,
  ...photoRoutes,
  ...documentRoutes,
  ...valuationRoutes,
];

let description: unknown;

const descriptionRoute = defineRoute({
  method: 'get',
  path: '/api/v1/openapi.json',
  summary: 'This description of the API (OpenAPI 3.1)',
  access: 'public',
  limit: 'read',
  handle: ({ res }) => {
    description ??= describeApi(allRoutes);
    res.json(description);
  },
});

/** Every route of the product. A test walks the mounted router and fails on one that does not stand here. */
export const allRoutes: readonly RouteDefinition[] = [...productRoutes, descriptionRoute];
