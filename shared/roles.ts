import { z } from 'zod';

/** The four roles; the seed or a command makes staff, sign-up makes members. */
export const ROLES = ['member', 'desk', 'lab', 'admin'] as const;
export type Role = (typeof ROLES)[number];
export const roleSchema = z.enum(ROLES);

/** True for those who work at the assay desk. */
export function isDeskStaff(role: Role): boolean {
  return role === 'desk' || role === 'admin';
}
