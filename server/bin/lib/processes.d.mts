export interface Identity {
  pid: number;
  startedTicks: string;
  command: string;
}
export function bootId(): string;
export function identify(pid: number): Identity | undefined;
export function endProcess(pid: number, patienceMs: number): Promise<void>;
