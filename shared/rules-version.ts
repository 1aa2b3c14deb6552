/** The rules that buyers and sellers confirm; a change of their text is a new version. Lots and deals keep theirs. */
export const RULES_VERSION = '2026-12';
