import { registerParcelTask } from '#server/features/parcels/register-parcel.ts';
import { PAYMENT_TASK_HANDLERS } from '#server/features/payments/payment-task-handlers.ts';
import type { ProviderTaskHandlers } from '#server/features/provider-tasks/provider-task-handler.ts';
import { defineJob } from './run-job.ts';
import { runProviderTasks } from './run-provider-tasks.ts';

/** Every kind of task and who does it. */
export const providerTaskHandlers: ProviderTaskHandlers = {
  ...PAYMENT_TASK_HANDLERS,
  register_parcel: registerParcelTask,
};

/** Transfers, payouts, refunds, expiries and parcels that commands have ordered. */
export const performProviderTasksJob = defineJob({
  name: 'perform-provider-tasks',
  everySeconds: 3,
  run: () => runProviderTasks(providerTaskHandlers),
});
