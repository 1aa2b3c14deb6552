import { useMutation } from '@tanstack/react-query';
import { useId, useState } from 'react';
import type { z } from 'zod';
import { ApiProblem } from './api-client.ts';

export type FormValues = Record<string, string | boolean>;
/** What is wrong, at the pointer of the field as it is sent; '' where it belongs to no field. */
export type Fault = { pointer: string; message: string };
export type Reading<Input> = { input: Input; faults: null } | { input: null; faults: Fault[] };

/** Reads values with the schema that the server reads them with. */
export function readBy<Input>(schema: z.ZodType<Input>, values: unknown): Reading<Input> {
  const parsed = schema.safeParse(values);
  if (parsed.success) return { input: parsed.data, faults: null };
  const faults = parsed.error.issues.map(({ path, message }) => ({
    pointer: path.map((part) => `/${String(part)}`).join(''),
    message,
  }));
  return { input: null, faults };
}

/** Refusals that speak of one field though the answer names none, by their code. */
const FIELD_OF_CODE: Readonly<Record<string, string>> = { 'email-taken': '/email' };

/** The refusal of a server as faults of the form. */
export function faultsOf(error: unknown): Fault[] {
  if (error instanceof ApiProblem && error.errors.length > 0)
    return error.errors.map(({ pointer, message }) => ({ pointer, message }));
  if (error instanceof ApiProblem)
    return [{ pointer: FIELD_OF_CODE[error.code] ?? '', message: error.detail }];
  return [{ pointer: '', message: error instanceof Error ? error.message : 'This did not work.' }];
}

type FormOptions<V extends FormValues, Input, Answer> = {
  initial: V;
  read: (values: V) => Reading<Input>;
  send: (input: Input) => Promise<Answer>;
  /** Refreshes what the act changed; the form stays busy until it has. */
  onDone: (answer: Answer) => Promise<unknown> | void;
  onRefused?: (error: unknown) => Promise<unknown> | void;
};

/**
 * Holds what is typed. Faults found here and refusals of the server end in the same summary and at the same fields, and
 * nothing typed is lost. `submit` sends at once; `ask` waits for `confirm`, where an act has to be restated first.
 */
export function useForm<V extends FormValues, Input, Answer>(options: FormOptions<V, Input, Answer>) {
  const { initial, read, send, onDone, onRefused } = options;
  const prefix = useId();
  const [values, setValues] = useState(initial);
  const [faults, setFaults] = useState<Fault[]>([]);
  const [attempt, setAttempt] = useState(0);
  const [asked, setAsked] = useState<Input | null>(null);
  const refuse = (found: Fault[]) => {
    setFaults(found);
    setAttempt((count) => count + 1);
    setAsked(null);
  };
  const mutation = useMutation({
    mutationFn: send,
    onSuccess: (answer) => {
      setFaults([]);
      return onDone(answer);
    },
    onError: (error) => {
      refuse(faultsOf(error));
      return onRefused?.(error);
    },
  });
  /** The field that a pointer belongs to: '/mass/value' is the field `mass` where there is no nearer one. */
  const fieldOf = (pointer: string) => pointer.split('/').find((part) => part in initial) ?? null;
  const fieldId = (name: keyof V & string) => `${prefix}${name}`;
  const checked = (then: (input: Input) => void) => {
    const reading = read(values);
    if (reading.faults !== null) return refuse(reading.faults);
    setFaults([]);
    then(reading.input);
  };
  return {
    values,
    attempt,
    fieldId,
    items: faults.map(({ pointer, message }) => {
      const field = fieldOf(pointer);
      return { fieldId: field === null ? null : fieldId(field), message };
    }),
    errorOf: (name: keyof V & string) => faults.find(({ pointer }) => fieldOf(pointer) === name)?.message,
    set: (name: keyof V & string, value: string | boolean) =>
      setValues((before) => ({ ...before, [name]: value })),
    isBusy: mutation.isPending,
    isAsking: asked !== null,
    asked,
    submit: () => checked((input) => mutation.mutate(input)),
    ask: () => checked(setAsked),
    confirm: () => asked !== null && mutation.mutate(asked),
    cancel: () => setAsked(null),
  };
}
