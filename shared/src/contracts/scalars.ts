import * as z from 'zod/mini';

export const rowId = z.uuid();
export const timestamp = z.iso.datetime();
export const pdfPaper = z.enum(['A4', 'Letter']);
export const currency = z.enum(['EUR', 'USD']);
export const moneySchema = z.object({ amountMinor: z.int(), currency });
export type Money = z.output<typeof moneySchema>;
/** Text a person typed in one line: trimmed, never empty. */
export const oneLine = (maximum: number) => z.string().check(z.trim(), z.minLength(1), z.maxLength(maximum));
