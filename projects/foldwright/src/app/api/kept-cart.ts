import { type CartLine, cartLineSchema } from '@foldwright/shared/contracts/storefront';
import * as z from 'zod/mini';

const linesSchema = z.array(cartLineSchema);

/** A cart as this browser kept it; empty when it was kept by another version. @throws SyntaxError when it is no JSON */
export function readKeptCart(kept: string | null): readonly CartLine[] {
  const parsed = z.safeParse(linesSchema, JSON.parse(kept ?? '[]'));
  return parsed.success ? parsed.data : [];
}
