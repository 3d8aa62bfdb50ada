import type { Money } from '@foldwright/shared/contracts/scalars';

/** What a cutting service needs to name a price. Sizes in mm, angles in degrees from flat. */
export interface PriceQuestion {
  /** Our own id of the question. */
  readonly reference: string;
  readonly partName: string;
  /** The cut file as text, exactly as it will be sent with the order. */
  readonly dxf: string;
  readonly materialId: string;
  readonly thicknessMm: number;
  readonly quantities: readonly number[];
  readonly currency: Money['currency'];
  readonly statement: 'cut-and-bend-to-our-flat' | 'formed-sizes-rule';
  readonly bends: readonly {
    readonly name: string;
    readonly angleDeg: number;
    readonly direction: 'toward' | 'away';
    readonly insideRadiusMm: number;
    readonly lengthMm: number;
  }[];
}

export interface PricedQuantity {
  readonly quantity: number;
  readonly each: Money;
  readonly total: Money;
  readonly lines: readonly { readonly label: string; readonly amount: Money }[];
  readonly leadTimeDays: number;
}

/** The service's opinion: a price for each quantity, or why it won't make the part. */
export type PriceAnswer =
  | {
      readonly kind: 'priced';
      readonly quoteReference: string;
      readonly validUntil: Date;
      readonly breaks: readonly PricedQuantity[];
    }
  | { readonly kind: 'refused'; readonly quoteReference: string; readonly reasons: readonly string[] };

export interface CutOrder {
  /** Our own id of the order: sent again, it is answered with the same order. */
  readonly reference: string;
  readonly quoteReference: string;
  readonly quantity: number;
  readonly dxf: string;
  readonly drawingPdf: Buffer;
}

/** Steps of the shop that we tell people about. */
export const CUTTING_STEPS = ['accepted', 'cutting', 'bending', 'shipped', 'refused'] as const;
export type CuttingStep = (typeof CUTTING_STEPS)[number];

/** What a signed callback says. `at` is the service's own time. */
export interface CuttingProgress {
  readonly id: string;
  readonly at: Date;
  /** Our own id of the order. */
  readonly orderReference: string;
  readonly step: CuttingStep;
  readonly trackingCode: string | null;
  /** Why it was handed back, in the service's words. */
  readonly reason: string | null;
}

/** Nobody answered in time. What was asked may or may not have happened; asking again does no harm. */
export class CuttingServiceUnreachable extends Error {}

/** The service answered something that can't be understood. */
export class CuttingServiceNonsense extends Error {}

/** The service understood the request and turned it down. */
export class CuttingServiceRefused extends Error {
  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}

/** An outside shop that cuts and bends. One adapter for each kind of interface. */
export interface CuttingService {
  /** As people know the shop. */
  readonly name: string;
  /** @throws CuttingServiceUnreachable, CuttingServiceNonsense, CuttingServiceRefused */
  askPrice(question: PriceQuestion): Promise<PriceAnswer>;
  /**
   * Hand over a paid order; a repeat changes nothing.
   * @returns the shop's own number for it
   * @throws CuttingServiceUnreachable, CuttingServiceNonsense, CuttingServiceRefused
   */
  placeOrder(order: CutOrder): Promise<string>;
  /**
   * Prove and read a callback, from its bytes as they came.
   * @param header value of a header of the message, by its lower-case name
   * @throws UnprovenCallback
   */
  readCallback(body: Buffer, header: (name: string) => string | undefined): CuttingProgress | null;
}

/** A callback that does not prove where it comes from, or is too old to count. */
export class UnprovenCallback extends Error {}
