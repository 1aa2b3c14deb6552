import { useMutation } from '@tanstack/react-query';
import { useId, useState } from 'react';
import type { z } from 'zod';
import type { SummaryItem } from '../../../components/ui/error-summary.tsx';
import { ApiProblem } from '../../../lib/api-client.ts';

type Values = Record<string, string | boolean>;
type Fault = { name: string | null; message: string };

type ActFormOptions<V extends Values, Input, Answer> = {
  initial: V;
  schema: z.ZodType<Input>;
  /** What is sent beside the fields, such as the version that was looked at. */
  extra?: object;
  send: (input: Input) => Promise<Answer>;
  /** Refreshes what the act changed; the form stays busy until it has. */
  onDone: (answer: Answer) => Promise<unknown> | void;
  /** After a refusal: what is shown may be older than what is. */
  onRefused?: () => Promise<unknown>;
};

function faultsOf(error: unknown): Fault[] {
  if (error instanceof ApiProblem && error.errors.length > 0)
    return error.errors.map(({ pointer, message }) => ({ name: pointer.slice(1) || null, message }));
  return [{ name: null, message: error instanceof Error ? error.message : 'This did not work.' }];
}

/**
 * A form whose act is restated before it happens: fill in, ask, confirm. Faults found here and refusals of the server end
 * in the same summary and at the same fields; nothing typed is lost.
 */
export function useActForm<V extends Values, Input, Answer>(options: ActFormOptions<V, Input, Answer>) {
  const { initial, schema, extra, send, onDone, onRefused } = options;
  const prefix = useId();
  const [values, setValues] = useState(initial);
  const [faults, setFaults] = useState<Fault[]>([]);
  const [attempt, setAttempt] = useState(0);
  const [confirmed, setConfirmed] = useState<Input | null>(null);
  const refuse = (found: Fault[]) => {
    setFaults(found);
    setAttempt((count) => count + 1);
    setConfirmed(null);
  };
  const mutation = useMutation({
    mutationFn: send,
    onSuccess: async (answer) => {
      setConfirmed(null);
      setValues(initial);
      await onDone(answer);
    },
    onError: (error) => {
      refuse(faultsOf(error));
      return onRefused?.();
    },
  });
  const fieldId = (name: string) => `${prefix}-${name}`;
  const isField = (name: string | null): name is string => name !== null && name in initial;
  const items: SummaryItem[] = faults.map(({ name, message }) => ({
    fieldId: isField(name) ? fieldId(name) : null,
    message,
  }));
  return {
    values,
    items,
    attempt,
    isConfirming: confirmed !== null,
    isBusy: mutation.isPending,
    fieldId,
    errorOf: (name: keyof V & string) => faults.find((fault) => fault.name === name)?.message,
    set: (name: keyof V & string, value: string | boolean) =>
      setValues((before) => ({ ...before, [name]: value })),
    ask: () => {
      const parsed = schema.safeParse({ ...values, ...extra });
      if (parsed.success) {
        setFaults([]);
        setConfirmed(parsed.data);
      } else {
        refuse(
          parsed.error.issues.map((issue) => ({
            name: issue.path.join('/') || null,
            message: issue.message,
          })),
        );
      }
    },
    confirm: () => confirmed !== null && mutation.mutate(confirmed),
    cancel: () => setConfirmed(null),
  };
}

export type ActForm = ReturnType<typeof useActForm<Values, unknown, unknown>>;
