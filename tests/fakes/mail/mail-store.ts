import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { simpleParser, type ParsedMail } from 'mailparser';
import { writeWhole } from '../kit/state-file.ts';

export type KeptAttachment = { filename: string; contentType: string; size: number; content: Buffer };
export type KeptMessage = {
  id: string;
  receivedAt: string;
  envelopeFrom: string;
  envelopeTo: string[];
  messageId: string | null;
  from: string;
  to: string;
  subject: string;
  text: string;
  html: string | null;
  attachments: KeptAttachment[];
};
type Receipt = Pick<KeptMessage, 'id' | 'receivedAt' | 'envelopeFrom' | 'envelopeTo'>;

function addressText(address: ParsedMail['to']): string {
  const list = address === undefined ? [] : Array.isArray(address) ? address : [address];
  return list.map(({ text }) => text).join(', ');
}

async function readMessage(receipt: Receipt, source: Buffer): Promise<KeptMessage> {
  const parsed = await simpleParser(source);
  return {
    ...receipt,
    messageId: parsed.messageId ?? null,
    from: addressText(parsed.from),
    to: addressText(parsed.to),
    subject: parsed.subject ?? '',
    text: parsed.text ?? '',
    html: parsed.html || null,
    attachments: parsed.attachments.map(({ filename, contentType, size, content }, index) => ({
      filename: filename ?? `attachment-${index + 1}`,
      contentType,
      size,
      content,
    })),
  };
}

/** Keeps messages in the order they came; with a folder, each as its source (.eml) and its receipt (.json). */
export async function openMailStore(folder: string | undefined, nowMs: () => number) {
  const messages: KeptMessage[] = [];
  let nextNumber = 1;
  if (folder) {
    mkdirSync(folder, { recursive: true });
    for (const name of readdirSync(folder).sort()) {
      const source = path.join(folder, name.replace(/\.json$/, '.eml'));
      if (!/^\d{8}\.json$/.test(name) || !existsSync(source)) continue;
      const receipt = JSON.parse(readFileSync(path.join(folder, name), 'utf8')) as Receipt;
      messages.push(await readMessage(receipt, readFileSync(source)));
      nextNumber = parseInt(receipt.id, 10) + 1;
    }
  }
  return {
    /** Resolves once the message is on disk. The receipt is written last: without it a message was not accepted. */
    async keep(source: Buffer, envelopeFrom: string, envelopeTo: string[]): Promise<KeptMessage> {
      const id = String(nextNumber).padStart(8, '0');
      nextNumber += 1;
      const receipt = { id, receivedAt: new Date(nowMs()).toISOString(), envelopeFrom, envelopeTo };
      const message = await readMessage(receipt, source);
      if (folder) {
        writeWhole(path.join(folder, `${id}.eml`), source);
        writeWhole(path.join(folder, `${id}.json`), JSON.stringify(receipt));
      }
      messages.push(message);
      return message;
    },
    /** Newest first; with an address, those delivered to it. */
    list(to: string | null): KeptMessage[] {
      const wanted = to?.trim().toLowerCase();
      const isFor = ({ envelopeTo }: KeptMessage) => envelopeTo.some((each) => each.toLowerCase() === wanted);
      return (wanted ? messages.filter(isFor) : [...messages]).reverse();
    },
    find: (id: string) => messages.find((message) => message.id === id) ?? null,
    recipients: () => [...new Set(messages.flatMap(({ envelopeTo }) => envelopeTo))].sort(),
    clear() {
      for (const { id } of messages.splice(0)) {
        if (!folder) continue;
        rmSync(path.join(folder, `${id}.json`), { force: true });
        rmSync(path.join(folder, `${id}.eml`), { force: true });
      }
    },
  };
}

export type MailStore = Awaited<ReturnType<typeof openMailStore>>;
