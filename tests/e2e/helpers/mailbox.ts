import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import type { Page } from 'playwright-core';
import { inject } from 'vitest';

const run = promisify(execFile);

/** Opens the newest mail with this subject in the mailbox page, which is asked again until it has come. */
export async function openMail(page: Page, owner: string, subject: RegExp): Promise<void> {
  const mailbox = `${inject('mailboxUrl')}/?to=${encodeURIComponent(owner)}`;
  const until = Date.now() + 45_000;
  for (;;) {
    await page.goto(mailbox);
    const mail = page.getByRole('link', { name: subject }).first();
    if ((await mail.count()) > 0) return mail.click();
    if (Date.now() > until)
      throw new Error(`No mail ${subject} for ${owner}:\n${await page.locator('ul').innerText()}`);
    await page.waitForTimeout(500);
  }
}

/** Loads a link's file down, as a click would. */
export async function download(page: Page, name: RegExp): Promise<{ name: string; bytes: Buffer }> {
  const started = page.waitForEvent('download');
  await page.getByRole('link', { name }).click();
  const file = await started;
  const parts: Buffer[] = [];
  for await (const part of await file.createReadStream()) parts.push(part as Buffer);
  return { name: file.suggestedFilename(), bytes: Buffer.concat(parts) };
}

/** The words of a PDF where `pdftotext` is on this machine; null where it is not. */
export async function wordsOfPdf(bytes: Buffer): Promise<string | null> {
  const process = run('pdftotext', ['-layout', '-', '-']);
  process.child.stdin?.on('error', () => undefined);
  process.child.stdin?.end(bytes);
  try {
    return (await process).stdout;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw error;
  }
}
