import { createHash } from 'node:crypto';

/** Names an account by what it is for; nobody outside the ledger handles account ids. */
export type AccountRef =
  | { kind: 'provider' | 'commission' | 'provider_fees' }
  | { kind: 'escrow'; dealId: string }
  | { kind: 'member_payable' | 'member_connected'; memberId: string };

export type AccountKind = AccountRef['kind'];

/** The accounts of the house: there from the first migration, append-only, summed when read. */
const SHARED_ACCOUNT_IDS: Partial<Record<AccountKind, string>> = {
  provider: '00000000-0000-7000-8000-00000000a001',
  commission: '00000000-0000-7000-8000-00000000a002',
  provider_fees: '00000000-0000-7000-8000-00000000a003',
};

/** The deal or member whose account it is; null for an account of the house. */
export function ownerOf(ref: AccountRef): string | null {
  if (ref.kind === 'escrow') return ref.dealId;
  if (ref.kind === 'member_payable' || ref.kind === 'member_connected') return ref.memberId;
  return null;
}

/** True when a balance row is kept. A row on an account of the house would queue every deal behind it. */
export function hasBalanceRow(ref: AccountRef): boolean {
  return ownerOf(ref) !== null;
}

/**
 * The account's id, derived from kind, owner and currency (a UUID of version 8): two transactions that open the same
 * account at once mean the same row, and posting needs no look-up.
 */
export function accountIdOf(ref: AccountRef): string {
  const shared = SHARED_ACCOUNT_IDS[ref.kind];
  if (shared !== undefined) return shared;
  const bytes = createHash('sha256')
    .update(`${ref.kind}:${String(ownerOf(ref))}:USD`)
    .digest();
  bytes[6] = (bytes[6]! & 0x0f) | 0x80;
  bytes[8] = (bytes[8]! & 0x3f) | 0x80;
  const hex = bytes.toString('hex');
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-${hex.slice(12, 16)}-${hex.slice(16, 20)}-${hex.slice(20, 32)}`;
}
