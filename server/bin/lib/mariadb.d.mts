export function installDatabase(folder: string, options?: { hasOpenRoot?: boolean }): { isNew: boolean };
export function serverCommand(
  folder: string,
  options: { port: number; initFile?: string; isDurable?: boolean },
): [string, ...string[]];
export function writeInitFile(
  file: string,
  options: { ownerPassword: string; appPassword: string; databases?: string[] },
): void;
export function waitForDatabase(
  port: number,
  options: { isAlive: () => boolean; readLog: () => string; patienceMs?: number },
): Promise<void>;
