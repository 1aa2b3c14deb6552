export function countVitest(reportFile: string, hasWorked: boolean): { passed: number; failed: number };
