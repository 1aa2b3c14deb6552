export function endLeftovers(file?: string): Promise<void>;
