export function writeJson(file: string, value: unknown, mode?: number): void;
export function readJson(file: string): unknown;
