export function freePort(): Promise<number>;
export function isPortFree(port: number, host?: string): Promise<boolean>;
