import type { Starter } from '@foldwright/shared/contracts/parts';

/** What a part starts from. */
export const ORIGINS = [
  'mock-up',
  'flat-plate',
  'l-bracket',
  'u-bracket',
  'z-bracket',
  'hat-section',
  'tray',
  'gusseted-l',
] as const;
export type Origin = (typeof ORIGINS)[number];

/** Every size any shape asks for; a shape uses its own. Null while a field holds nothing usable. */
export interface StarterSizes {
  readonly widthMm: number | null;
  readonly heightMm: number | null;
  readonly baseMm: number | null;
  readonly flangeMm: number | null;
  readonly leftFlangeMm: number | null;
  readonly rightFlangeMm: number | null;
  readonly webMm: number | null;
  readonly lowerFlangeMm: number | null;
  readonly upperFlangeMm: number | null;
  readonly topMm: number | null;
  readonly sideMm: number | null;
  readonly brimMm: number | null;
  readonly lengthMm: number | null;
  readonly gussetMm: number | null;
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
  'z-bracket': [
    { name: 'webMm', label: 'Web, over both flanges' },
    { name: 'lowerFlangeMm', label: 'Lower flange' },
    { name: 'upperFlangeMm', label: 'Upper flange' },
    { name: 'widthMm', label: 'Width along the bends' },
  ],
  'hat-section': [
    { name: 'topMm', label: 'Top' },
    { name: 'sideMm', label: 'Height' },
    { name: 'brimMm', label: 'Brims' },
    { name: 'widthMm', label: 'Width along the bends' },
  ],
  tray: [
    { name: 'lengthMm', label: 'Length' },
    { name: 'widthMm', label: 'Width' },
    { name: 'flangeMm', label: 'Height' },
  ],
  'gusseted-l': [
    { name: 'baseMm', label: 'Base' },
    { name: 'flangeMm', label: 'Flange' },
    { name: 'widthMm', label: 'Width along the bend' },
    { name: 'gussetMm', label: 'Gusset, along and up' },
  ],
};

export function sizeFieldsOf(origin: Origin): readonly SizeField[] {
  return SIZE_FIELDS[origin];
}

/** Whether the shape is asked for a bend angle; the others are square. */
export function hasAngle(origin: Origin): boolean {
  return origin === 'l-bracket' || origin === 'u-bracket';
}

export function isOrigin(value: string | undefined): value is Origin {
  return ORIGINS.some((origin) => origin === value);
}

type Known<Name extends keyof StarterSizes> = { readonly [Key in Name]: number };

/** These sizes when none of them is missing, else null. */
function known<Name extends keyof StarterSizes>(sizes: StarterSizes, ...names: readonly Name[]): Known<Name> | null {
  const isKnown = (all: StarterSizes): all is StarterSizes & Known<Name> => names.every((name) => all[name] !== null);
  return isKnown(sizes) ? sizes : null;
}

/** The typed dimensions of a shape; null for a mock-up and while a size is missing. */
export function starterFrom(shape: Origin, sizes: StarterSizes): Starter | null {
  switch (shape) {
    case 'mock-up':
      return null;
    case 'flat-plate': {
      const all = known(sizes, 'widthMm', 'heightMm');
      return all && { shape, widthMm: all.widthMm, heightMm: all.heightMm };
    }
    case 'l-bracket': {
      const all = known(sizes, 'baseMm', 'flangeMm', 'widthMm', 'bendAngleDeg');
      if (all === null) return null;
      const { baseMm, flangeMm, widthMm, bendAngleDeg } = all;
      return { shape, baseMm, flangeMm, widthMm, bendAngleDeg };
    }
    case 'u-bracket': {
      const all = known(sizes, 'baseMm', 'leftFlangeMm', 'rightFlangeMm', 'widthMm', 'bendAngleDeg');
      if (all === null) return null;
      const { baseMm, leftFlangeMm, rightFlangeMm, widthMm, bendAngleDeg } = all;
      return { shape, baseMm, leftFlangeMm, rightFlangeMm, widthMm, bendAngleDeg };
    }
    case 'z-bracket': {
      const all = known(sizes, 'webMm', 'lowerFlangeMm', 'upperFlangeMm', 'widthMm');
      if (all === null) return null;
      const { webMm, lowerFlangeMm, upperFlangeMm, widthMm } = all;
      return { shape, webMm, lowerFlangeMm, upperFlangeMm, widthMm };
    }
    case 'hat-section': {
      const all = known(sizes, 'topMm', 'sideMm', 'brimMm', 'widthMm');
      if (all === null) return null;
      const { topMm, sideMm, brimMm, widthMm } = all;
      return { shape, topMm, sideMm, brimMm, widthMm };
    }
    case 'tray': {
      const all = known(sizes, 'lengthMm', 'widthMm', 'flangeMm');
      return all && { shape, lengthMm: all.lengthMm, widthMm: all.widthMm, flangeMm: all.flangeMm };
    }
    case 'gusseted-l': {
      const all = known(sizes, 'baseMm', 'flangeMm', 'widthMm', 'gussetMm');
      if (all === null) return null;
      const { baseMm, flangeMm, widthMm, gussetMm } = all;
      return { shape, baseMm, flangeMm, widthMm, gussetMm };
    }
  }
}
