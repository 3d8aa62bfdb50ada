import type { Starter } from '@foldwright/shared/contracts/parts';

/** What a part starts from. */
export const ORIGINS = ['mock-up', 'flat-plate', 'l-bracket', 'u-bracket'] as const;
export type Origin = (typeof ORIGINS)[number];

/** Every size any shape asks for; a shape uses its own. Null while a field holds nothing usable. */
export interface StarterSizes {
  readonly widthMm: number | null;
  readonly heightMm: number | null;
  readonly baseMm: number | null;
  readonly flangeMm: number | null;
  readonly leftFlangeMm: number | null;
  readonly rightFlangeMm: number | null;
  readonly bendAngleDeg: number | null;
}

export type SizeName = Exclude<keyof StarterSizes, 'bendAngleDeg'>;

/** A size to ask for, in the words of somebody who holds the part. */
export interface SizeField {
  readonly name: SizeName;
  readonly label: string;
}

const SIZE_FIELDS: Readonly<Record<Origin, readonly SizeField[]>> = {
  'mock-up': [],
  'flat-plate': [
    { name: 'widthMm', label: 'Length' },
    { name: 'heightMm', label: 'Width' },
  ],
  'l-bracket': [
    { name: 'baseMm', label: 'Base' },
    { name: 'flangeMm', label: 'Flange' },
    { name: 'widthMm', label: 'Width along the bend' },
  ],
  'u-bracket': [
    { name: 'baseMm', label: 'Base' },
    { name: 'leftFlangeMm', label: 'Left flange' },
    { name: 'rightFlangeMm', label: 'Right flange' },
    { name: 'widthMm', label: 'Width along the bends' },
  ],
};

export function sizeFieldsOf(origin: Origin): readonly SizeField[] {
  return SIZE_FIELDS[origin];
}

export function hasBend(origin: Origin): boolean {
  return origin === 'l-bracket' || origin === 'u-bracket';
}

export function isOrigin(value: string | undefined): value is Origin {
  return ORIGINS.some((origin) => origin === value);
}

/** The typed dimensions of a shape; null for a mock-up and while a size is missing. */
export function starterFrom(origin: Origin, sizes: StarterSizes): Starter | null {
  const { widthMm, heightMm, baseMm, flangeMm, leftFlangeMm, rightFlangeMm, bendAngleDeg } = sizes;
  switch (origin) {
    case 'mock-up':
      return null;
    case 'flat-plate':
      return widthMm === null || heightMm === null ? null : { shape: origin, widthMm, heightMm };
    case 'l-bracket':
      return baseMm === null || flangeMm === null || widthMm === null || bendAngleDeg === null
        ? null
        : { shape: origin, baseMm, flangeMm, widthMm, bendAngleDeg };
    case 'u-bracket':
      return baseMm === null ||
        leftFlangeMm === null ||
        rightFlangeMm === null ||
        widthMm === null ||
        bendAngleDeg === null
        ? null
        : { shape: origin, baseMm, leftFlangeMm, rightFlangeMm, widthMm, bendAngleDeg };
  }
}
