import type { z } from 'zod';
import type { DealState } from '#shared/deal-states.ts';

/** Who reads it: the name to greet and the zone that every moment is written in. */
export type MailReader = { displayName: string; timeZone: string };

/** A mail's content, once: the layout makes the text and the HTML from it, so that both say the same. */
export type MailContent = {
  subject: string;
  heading: string;
  paragraphs: string[];
  facts: { label: string; value: string }[];
  /** A page of the product, by its path. */
  action: { label: string; path: string } | null;
  closing: string[];
};

export type SheetAttachment = {
  kind: 'final-sheet';
  dealCode: string;
  audience: 'buyer' | 'seller';
};

export type MailDefinition<Input> = {
  /** For the table of mails: who gets it, when, and what it says. */
  audience: string;
  trigger: string;
  says: string;
  input: z.ZodType<Input>;
  /** Where it asks for something by a day: the states in which that still holds. Sent late, it is dropped instead. */
  appliesWhile?: readonly DealState[];
  write: (input: Input, reader: MailReader) => MailContent;
  attach?: (input: Input) => SheetAttachment;
};

/** Keeps a mail's input type together with its writer. */
export function defineMail<Input>(definition: MailDefinition<Input>): MailDefinition<Input> {
  return definition;
}
