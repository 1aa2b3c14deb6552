import { createPath, type Path } from 'react-router-dom';

const KEY = 'scruple:reloaded-at';
const PAUSE_MS = 60_000;

function mayReload(nowMs: number): boolean {
  try {
    const before = Number.parseInt(sessionStorage.getItem(KEY) ?? '0', 10);
    if (nowMs - before < PAUSE_MS) return false;
    sessionStorage.setItem(KEY, String(nowMs));
    return true;
  } catch {
    // Without a memory of it, reloading could go on for ever.
    return false;
  }
}

async function isServed(address: string): Promise<boolean> {
  try {
    return (await fetch(address, { method: 'HEAD', cache: 'no-store' })).ok;
  } catch {
    return false;
  }
}

type Options = {
  /** Where the reader was going when the part was asked for; null while nothing is being opened. */
  goingTo: () => Partial<Path> | null;
  /** Replaced in tests: a test page cannot be left. */
  load?: (address: string) => void;
  now?: () => number;
};

/**
 * A page that was opened before a new build asks for parts that are gone: it is loaded anew, once, at the address that
 * was asked for. Without a connection it stays as it is. Answers with the way to stop listening.
 */
export function reloadOnLostChunk(options: Options): () => void {
  const { goingTo, load = (address) => window.location.assign(address), now = Date.now } = options;
  const onLost = async () => {
    const target = goingTo() ?? window.location;
    const address = createPath({ pathname: target.pathname, search: target.search, hash: '' });
    if ((await isServed('/')) && mayReload(now())) load(address);
  };
  const listener = () => void onLost();
  window.addEventListener('vite:preloadError', listener);
  return () => window.removeEventListener('vite:preloadError', listener);
}
