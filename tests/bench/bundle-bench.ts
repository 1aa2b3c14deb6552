import { mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import { chromium, type Browser } from 'playwright-core';
import react from '@vitejs/plugin-react';
import { build } from 'vite';
import { inTwo, printTable } from './timing.ts';

const root = path.resolve(import.meta.dirname, '../..');
const BARE = `
import { createElement } from 'react';
import { createRoot } from 'react-dom/client';
import { createBrowserRouter, RouterProvider } from 'react-router-dom';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
const router = createBrowserRouter([{ path: '/', element: createElement('p', null, 'Home') }]);
const client = new QueryClient();
createRoot(document.getElementById('root')).render(
  createElement(QueryClientProvider, { client }, createElement(RouterProvider, { router })),
);
`;

/** Builds the client as it is shipped, into a folder of this run. */
export async function buildClient(outDir: string): Promise<void> {
  await build({
    root: path.join(root, 'client'),
    configFile: path.join(root, 'vite.config.ts'),
    logLevel: 'error',
    build: { outDir, emptyOutDir: true },
  });
}

/** The bare libraries, built in the same way: bytes after gzip. */
export async function bareBytes(folder: string): Promise<number> {
  const source = path.join(folder, 'bare');
  mkdirSync(source, { recursive: true });
  const entry = path.join(source, 'bare.js');
  writeFileSync(entry, BARE);
  const made = await build({
    root,
    configFile: false,
    logLevel: 'error',
    plugins: [react()],
    resolve: { dedupe: ['react', 'react-dom', 'react-router-dom', '@tanstack/react-query'] },
    build: { write: false, target: 'es2022', rollupOptions: { input: entry } },
  });
  const outputs = (Array.isArray(made) ? made : [made]) as { output: { type: string; code?: string }[] }[];
  const code = outputs.flatMap(({ output }) => output).flatMap((chunk) => chunk.code ?? []);
  return code.reduce((sum, text) => sum + gzipSync(text, { level: 9 }).byteLength, 0);
}

/** Every script that the home page loads until the network is quiet, each compressed by itself. */
async function homeBytes(browser: Browser, url: string): Promise<{ bytes: number; files: number }> {
  const page = await browser.newPage();
  const bodies: Promise<Buffer>[] = [];
  page.on('response', (response) => {
    if (response.request().resourceType() === 'script') bodies.push(response.body());
  });
  await page.goto(url, { waitUntil: 'networkidle' });
  const scripts = await Promise.all(bodies);
  const bytes = scripts.reduce((sum, body) => sum + gzipSync(body, { level: 9 }).byteLength, 0);
  return { bytes, files: scripts.length };
}

/** First-load JavaScript of the home page against the bare libraries that it stands on. */
export async function benchBundle(productUrl: string, bare: number): Promise<void> {
  const browser = await chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: [
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
    ],
  });
  try {
    const home = await homeBytes(browser, productUrl);
    const kilobytes = (bytes: number) => inTwo(bytes / 1000);
    printTable(
      'First-load JavaScript of the home page (kB, gzip -9)',
      ['', 'kB', 'files', 'ratio'],
      [
        ['home page', kilobytes(home.bytes), String(home.files), inTwo(home.bytes / bare)],
        ['bare React + Router + Query', kilobytes(bare), '1', '1'],
      ],
    );
  } finally {
    await browser.close();
  }
}
