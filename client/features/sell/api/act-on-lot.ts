import type { LotAnswer } from '#shared/schemas/lots.ts';
import { apiSend } from '../../../lib/api-client.ts';
import { lotUrl } from '../../../lib/lots.ts';

/** What a seller does with a lot that was handed in; the body goes as the act wants it. */
export type LotAct =
  | { act: 'redraft' | 'pause' | 'reopen' }
  | { act: 'withdraw'; reason: string }
  | { act: 'price'; price: string }
  | { act: 'price'; linkedPercent: string };

/** Does it and answers the lot as it then stands. */
export function actOnLot(code: string, { act, ...body }: LotAct): Promise<LotAnswer> {
  const hasBody = Object.keys(body).length > 0;
  return apiSend<LotAnswer>(`${lotUrl(code)}/${act}`, hasBody ? { body } : {});
}
