import { payoutTask } from '#server/features/payouts/payout-task.ts';
import { transferTask } from '#server/features/payouts/transfer-task.ts';
import { expireSessionTask } from './expire-session-task.ts';
import type { ProviderTaskHandlers } from '#server/features/provider-tasks/provider-task-handler.ts';
import { refundSecondTask } from './refund-second-task.ts';
import { refundTask } from './refund-task.ts';

/** How each task at the payment provider is done. */
export const PAYMENT_TASK_HANDLERS = {
  expire_session: expireSessionTask,
  refund: refundTask,
  refund_second: refundSecondTask,
  transfer: transferTask,
  payout: payoutTask,
} satisfies ProviderTaskHandlers;
