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
export async function openMailDoor(store: MailStore, requestedPort: number) {
  let fault: MailFault = { kind: 'none' };
  let server: SMTPServer | null = null;
  let port = requestedPort;

  const spend = () => {
    if (!('count' in fault) || fault.count === null) return;
    fault.count -= 1;
    if (fault.count <= 0) fault = { kind: 'none' };
  };

  function refusal(address: string): Error | null {
    if (fault.kind !== 'refuse') return null;
    if (fault.to && fault.to.toLowerCase() !== address.toLowerCase()) return null;
    const { code } = fault;
    spend();
    return smtpError(code, code === 450 ? 'Mailbox busy, try again later' : 'No such mailbox here');
  }

  async function receive(stream: SMTPServerDataStream, session: SMTPServerSession) {
    const source = await readSource(stream);
    if (stream.sizeExceeded) throw smtpError(552, 'Message too large');
    if (fault.kind === 'delay') {
      const { seconds } = fault;
      spend();
      await wait(seconds * 1000);
    }
    const { mailFrom, rcptTo } = session.envelope;
    const to = rcptTo.map(({ address }) => address);
    return store.keep(source, mailFrom ? mailFrom.address : '', to);
  }

  function open(): Promise<void> {
    const opened = new SMTPServer({
      authOptional: true,
      disabledCommands: ['STARTTLS'],
      disableReverseLookup: true,
      size: bytesMax,
      closeTimeout: 500,
      onAuth: (_auth, _session, callback) => callback(null, { user: 'anyone' }),
      onRcptTo: ({ address }, _session, callback) => callback(refusal(address)),
      onData: (stream, session, callback) => {
        receive(stream, session).then(
          ({ id }) => callback(null, `kept as ${id}`),
          (error: unknown) => callback(error instanceof Error ? error : new Error(String(error))),
        );
      },
    });
    // A client that hangs up in the middle is its own affair, not a fault of this process.
    opened.on('error', (error) => process.stderr.write(`smtp: ${error.message}\n`));
    return new Promise((resolve, reject) => {
      opened.server.once('error', reject);
      opened.listen(port, '127.0.0.1', () => {
        opened.server.off('error', reject);
        port = (opened.server.address() as AddressInfo).port;
        server = opened;
        resolve();
      });
    });
  }

  function shut(): Promise<void> {
    const closing = server;
    server = null;
    return closing ? new Promise((resolve) => closing.close(() => resolve())) : Promise.resolve();
  }

  await open();
  return {
    port: () => port,
    fault: () => fault,
    async setFault(next: MailFault) {
      fault = next;
      if (next.kind === 'down') await shut();
      else if (!server) await open();
    },
    close: shut,
  };
}

export type MailDoor = Awaited<ReturnType<typeof openMailDoor>>;
