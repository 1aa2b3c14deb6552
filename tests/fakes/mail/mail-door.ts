import { setTimeout as wait } from 'node:timers/promises';
import type { AddressInfo } from 'node:net';
import { SMTPServer, type SMTPServerDataStream, type SMTPServerSession } from 'smtp-server';
import type { MailStore } from './mail-store.ts';

export type MailFault =
  | { kind: 'none' }
  | { kind: 'refuse'; code: 450 | 550; count: number | null; to: string | null }
  | { kind: 'delay'; seconds: number; count: number | null }
  | { kind: 'down' };

const bytesMax = 25_000_000;

function smtpError(code: number, message: string): Error {
  return Object.assign(new Error(message), { responseCode: code });
}

async function readSource(stream: SMTPServerDataStream): Promise<Buffer> {
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks);
}

/** The SMTP side: accepts mail into the store, or misbehaves as ordered. */
export class MailDoor {
  fault: MailFault = { kind: 'none' };
  port: number;
  readonly #store: MailStore;
  #server: SMTPServer | null = null;

  constructor(store: MailStore, port: number) {
    this.#store = store;
    this.port = port;
  }

  #spend() {
    if (!('count' in this.fault) || this.fault.count === null) return;
    this.fault.count -= 1;
    if (this.fault.count <= 0) this.fault = { kind: 'none' };
  }

  #refusal(address: string): Error | null {
    const { fault } = this;
    if (fault.kind !== 'refuse') return null;
    if (fault.to && fault.to.toLowerCase() !== address.toLowerCase()) return null;
    this.#spend();
    return smtpError(
      fault.code,
      fault.code === 450 ? 'Mailbox busy, try again later' : 'No such mailbox here',
    );
  }

  async #receive(stream: SMTPServerDataStream, session: SMTPServerSession) {
    const source = await readSource(stream);
    if (stream.sizeExceeded) throw smtpError(552, 'Message too large');
    if (this.fault.kind === 'delay') {
      const { seconds } = this.fault;
      this.#spend();
      await wait(seconds * 1000);
    }
    const { mailFrom, rcptTo } = session.envelope;
    const to = rcptTo.map(({ address }) => address);
    return this.#store.keep(source, mailFrom ? mailFrom.address : '', to);
  }

  #makeServer(): SMTPServer {
    const server = new SMTPServer({
      authOptional: true,
      disabledCommands: ['STARTTLS'],
      disableReverseLookup: true,
      size: bytesMax,
      closeTimeout: 500,
      onAuth: (_auth, _session, callback) => callback(null, { user: 'anyone' }),
      onRcptTo: ({ address }, _session, callback) => callback(this.#refusal(address)),
      onData: (stream, session, callback) => {
        this.#receive(stream, session).then(
          ({ id }) => callback(null, `kept as ${id}`),
          (error: unknown) => callback(error instanceof Error ? error : new Error(String(error))),
        );
      },
    });
    // A client that hangs up in the middle is its own affair, not a fault of this process.
    server.on('error', (error) => process.stderr.write(`smtp: ${error.message}\n`));
    return server;
  }

  open(): Promise<void> {
    if (this.#server) return Promise.resolve();
    const opened = this.#makeServer();
    this.#server = opened;
    return new Promise((resolve, reject) => {
      opened.server.once('error', reject);
      opened.listen(this.port, '127.0.0.1', () => {
        opened.server.off('error', reject);
        this.port = (opened.server.address() as AddressInfo).port;
        resolve();
      });
    });
  }

  close(): Promise<void> {
    const closing = this.#server;
    this.#server = null;
    return closing ? new Promise((resolve) => closing.close(() => resolve())) : Promise.resolve();
  }

  async setFault(next: MailFault) {
    this.fault = next;
    if (next.kind === 'down') await this.close();
    else await this.open();
  }
}
