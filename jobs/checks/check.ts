/** One thing that is always true. `find` answers a sentence for each place where it is not. */
export type Check = { name: string; states: string; find: () => Promise<string[]> };
