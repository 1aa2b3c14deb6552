import { createTransport, type SentMessageInfo } from 'nodemailer';
import { z } from 'zod';

export type MailFailureReason =
  'invalid' | 'unreachable' | 'timeout' | 'refused-for-now' | 'refused-for-good';

/** A mail that was not accepted. Only `invalid` and `refused-for-good` are hopeless; the rest is worth another try. */
export class MailServiceError extends Error {
  readonly reason: MailFailureReason;
  readonly responseCode: number | null;
  constructor(reason: MailFailureReason, message: string, options: { code?: number; cause?: unknown } = {}) {
    super(message, { cause: options.cause });
    this.name = 'MailServiceError';
    this.reason = reason;
    this.responseCode = options.code ?? null;
  }
  get isWorthRetry(): boolean {
    return this.reason !== 'invalid' && this.reason !== 'refused-for-good';
  }
}

export type MailAttachment = { filename: string; contentType: string; content: Buffer };
export type OutgoingMail = {
  /** Exactly one address. */
  to: string;
  subject: string;
  text: string;
  html: string;
  attachments?: readonly MailAttachment[];
  /** `<local@domain>`, made by the caller and kept over retries, so that a mail sent twice is seen as one. */
  messageId: string;
};
export type Mailer = {
  /** Resolves when the mail server has accepted the mail; rejects with `MailServiceError`. */
  sendMail: (mail: OutgoingMail) => Promise<{ messageId: string; response: string }>;
  close: () => void;
};
export type MailerOptions = { smtpUrl: string; from: string; timeoutMs?: number };

// A header is one line: a line break in a value would begin a header of the sender's choice.
const headerText = z.string().regex(/^[^\p{Cc}\u2028\u2029]*$/u, 'no line breaks or control characters');
const mailSchema = z.object({
  to: headerText.max(254).regex(/^[^\s@<>",;:()[\]\\]+@[^\s@<>",;:()[\]\\]+$/, 'one address'),
  subject: headerText.min(1).max(300),
  messageId: headerText.max(250).regex(/^<[^\s@<>]+@[^\s@<>]+>$/, 'of the form <local@domain>'),
  text: z.string(),
  html: z.string(),
  attachments: z
    .array(
      z.object({
        filename: headerText.min(1).max(200),
        contentType: headerText.regex(/^[\w.+-]+\/[\w.+-]+$/),
        content: z.instanceof(Buffer),
      }),
    )
    .default([]),
});

const timeoutCodes = new Set(['ETIMEDOUT', 'ETIME']);

function asMailError(error: unknown): MailServiceError {
  const { code, responseCode } = (error ?? {}) as { code?: string; responseCode?: number };
  const message = error instanceof Error ? error.message : String(error);
  if (typeof responseCode === 'number' && responseCode >= 400) {
    const reason = responseCode >= 500 ? 'refused-for-good' : 'refused-for-now';
    return new MailServiceError(reason, message, { code: responseCode, cause: error });
  }
  const isTimeout = timeoutCodes.has(code ?? '') || /timeout/i.test(message);
  return new MailServiceError(isTimeout ? 'timeout' : 'unreachable', message, { cause: error });
}

function connection(smtpUrl: string, timeoutMs: number) {
  const url = new URL(smtpUrl);
  const isSecure = url.protocol === 'smtps:';
  const isLoopback = ['127.0.0.1', '[::1]', 'localhost'].includes(url.hostname);
  const port = url.port === '' ? (isSecure ? 465 : 587) : parseInt(url.port, 10);
  return {
    host: url.hostname.replace(/^\[|\]$/g, ''),
    port,
    secure: isSecure,
    // Off this machine a mail carries names and sums, so an unencrypted connection is refused.
    ...(isLoopback ? { ignoreTLS: !isSecure } : { requireTLS: true }),
    ...(url.username === ''
      ? {}
      : { auth: { user: decodeURIComponent(url.username), pass: decodeURIComponent(url.password) } }),
    connectionTimeout: timeoutMs,
    greetingTimeout: timeoutMs,
    socketTimeout: timeoutMs,
    disableFileAccess: true,
    disableUrlAccess: true,
  };
}

/** The mail server, over SMTP. */
export function createMailer({ smtpUrl, from, timeoutMs = 15_000 }: MailerOptions): Mailer {
  const transport = createTransport({
    ...connection(smtpUrl, timeoutMs),
    pool: true,
    maxConnections: 2,
    maxRequeues: 0,
  });
  // An idle pooled connection that dies reports here; the next mail opens another.
  transport.on('error', () => undefined);
  return {
    async sendMail(mail) {
      const checked = mailSchema.safeParse(mail);
      if (!checked.success) throw new MailServiceError('invalid', z.prettifyError(checked.error));
      const { to, ...rest } = checked.data;
      try {
        const info: SentMessageInfo = await transport.sendMail({
          ...rest,
          from,
          to: { name: '', address: to },
        });
        return { messageId: mail.messageId, response: String(info.response) };
      } catch (error) {
        throw asMailError(error);
      }
    },
    close: () => transport.close(),
  };
}
