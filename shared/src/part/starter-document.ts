import type { BendDeclaration, BendDirection, Layout, OutlineLoop } from '../bending/layout';
import type { Point } from '../geometry/point';
import { gussetedLayout, trayLayout } from './folded-starters';
import type { PartDocument, SheetStock } from './part-document';

/**
 * Typed dimensions to start from. Every length is an outside size of the formed part, mm: to the outside apex for bends
 * up to 90°, to the outermost point of the bend beyond. `widthMm` runs along the bends.
 */
export type StarterShape =
  | { readonly shape: 'flat-plate'; readonly widthMm: number; readonly heightMm: number }
  | {
      readonly shape: 'l-bracket';
      readonly baseMm: number;
      readonly flangeMm: number;
      readonly widthMm: number;
      readonly bendAngleDeg: number;
    }
  | {
      readonly shape: 'u-bracket';
      readonly baseMm: number;
      readonly leftFlangeMm: number;
      readonly rightFlangeMm: number;
      readonly widthMm: number;
      readonly bendAngleDeg: number;
    }
  | {
      readonly shape: 'z-bracket';
      /** Web over both thicknesses; the flanges point opposite ways. */
      readonly webMm: number;
      readonly lowerFlangeMm: number;
      readonly upperFlangeMm: number;
      readonly widthMm: number;
    }
  | {
      readonly shape: 'hat-section';
      readonly topMm: number;
      readonly sideMm: number;
      readonly brimMm: number;
      readonly widthMm: number;
    }
  | {
      readonly shape: 'tray';
      /** Outside of the tray on the ground, and its height. */
      readonly lengthMm: number;
      readonly widthMm: number;
      readonly flangeMm: number;
    }
  | {
      readonly shape: 'gusseted-l';
      readonly baseMm: number;
      readonly flangeMm: number;
      readonly widthMm: number;
      /** Legs of the gusset, along the base and up the flange; it is folded up from one side of the base. */
      readonly gussetMm: number;
    };

/** Sheet for the trial: thin steel that any shop has. */
export const DEFAULT_TRIAL_STOCK: SheetStock = {
  materialId: 'dc01',
  thicknessMm: 1.5,
  grainDirectionDeg: null,
  vOpeningMm: null,
};

/** Sheet for the part itself until a person chooses another. */
export const DEFAULT_PRODUCTION_STOCK: SheetStock = {
  materialId: 'al5052h32',
  thicknessMm: 3,
  grainDirectionDeg: null,
  vOpeningMm: null,
};

/** A document that holds a layout and nothing a person decided yet: default stocks, no template, own brake. */
export function emptyDocument(layout: Layout): PartDocument {
  return {
    schemaVersion: 1,
    stocks: { trial: DEFAULT_TRIAL_STOCK, production: DEFAULT_PRODUCTION_STOCK },
    template: null,
    calibration: { scaleX: 1, scaleY: 1 },
    layout,
    making: { bender: 'own-brake', statement: 'cut-and-bend-to-our-flat' },
    declaredUses: [],
  };
}

/**
 * The document of a part that starts from typed outside sizes. The layout is a strip along x with its lower-left corner
 * at the origin; bends run along y; the base panel is the base, the web or the top.
 * Ids are fixed ("outer", "e1", "b1"), so the same sizes always give the same document.
 * @throws RangeError naming the size when one is not above 0 or an angle is outside 5 to 165
 */
export function starterDocument(starter: StarterShape): PartDocument {
  return emptyDocument(starterLayout(starter));
}

function starterLayout(starter: StarterShape): Layout {
  switch (starter.shape) {
    case 'flat-plate':
      return strip([sized('widthMm', starter.widthMm)], [], sized('heightMm', starter.heightMm), 0);
    case 'l-bracket':
      return strip(
        [sized('baseMm', starter.baseMm), sized('flangeMm', starter.flangeMm)],
        [{ bendAngleDeg: angled(starter.bendAngleDeg), direction: 'towards' }],
        sized('widthMm', starter.widthMm),
        0,
      );
    case 'u-bracket': {
      const bend = { bendAngleDeg: angled(starter.bendAngleDeg), direction: 'towards' } as const;
      return strip(
        [
          sized('leftFlangeMm', starter.leftFlangeMm),
          sized('baseMm', starter.baseMm),
          sized('rightFlangeMm', starter.rightFlangeMm),
        ],
        [bend, bend],
        sized('widthMm', starter.widthMm),
        1,
      );
    }
    case 'z-bracket':
      return strip(
        [
          sized('lowerFlangeMm', starter.lowerFlangeMm),
          sized('webMm', starter.webMm),
          sized('upperFlangeMm', starter.upperFlangeMm),
        ],
        [
          { bendAngleDeg: 90, direction: 'towards' },
          { bendAngleDeg: 90, direction: 'away' },
        ],
        sized('widthMm', starter.widthMm),
        1,
      );
    case 'hat-section': {
      const brim = { bendAngleDeg: 90, direction: 'towards' } as const;
      const shoulder = { bendAngleDeg: 90, direction: 'away' } as const;
      const brimMm = sized('brimMm', starter.brimMm);
      const sideMm = sized('sideMm', starter.sideMm);
      return strip(
        [brimMm, sideMm, sized('topMm', starter.topMm), sideMm, brimMm],
        [brim, shoulder, shoulder, brim],
        sized('widthMm', starter.widthMm),
        2,
      );
    }
    case 'tray':
      return trayLayout(
        sized('lengthMm', starter.lengthMm),
        sized('widthMm', starter.widthMm),
        sized('flangeMm', starter.flangeMm),
      );
    case 'gusseted-l': {
      const { baseMm, flangeMm, widthMm, gussetMm } = starter;
      return gussetedLayout({
        baseMm: sized('baseMm', baseMm),
        flangeMm: sized('flangeMm', flangeMm),
        widthMm: sized('widthMm', widthMm),
        gussetMm: sized('gussetMm', gussetMm),
      });
    }
  }
}

interface StripBend {
  readonly bendAngleDeg: number;
  readonly direction: BendDirection;
}

/** A rectangle with its bends across it, one between each two lengths. */
function strip(
  lengthsMm: readonly number[],
  bends: readonly StripBend[],
  widthMm: number,
  basePanelIndex: number,
): Layout {
  const ends: number[] = [];
  let totalMm = 0;
  for (const lengthMm of lengthsMm) {
    totalMm += lengthMm;
    ends.push(totalMm);
  }
  const baseEndMm = ends[basePanelIndex] ?? totalMm;
  const baseStartMm = baseEndMm - (lengthsMm[basePanelIndex] ?? totalMm);
  return {
    outer: rectangleLoop('outer', { x: 0, y: 0 }, { x: totalMm, y: widthMm }),
    cutouts: [],
    features: [],
    bends: bends.map((bend, index) => stripBend(`b${index + 1}`, bend, ends[index] ?? totalMm, widthMm)),
    reliefs: { mode: 'automatic', widthMm: null, depthMm: null, shape: 'obround' },
    baseAnchor: { x: (baseStartMm + baseEndMm) / 2, y: widthMm / 2 },
  };
}

function stripBend(id: string, bend: StripBend, x: number, widthMm: number): BendDeclaration {
  return {
    id,
    line: { from: { x, y: 0 }, to: { x, y: widthMm } },
    bendAngleDeg: bend.bendAngleDeg,
    direction: bend.direction,
    // Beyond 90° the outside apex runs away from the metal; callipers reach the outermost point of the bend instead.
    lengths: { from: 'reference', reference: bend.bendAngleDeg > 90 ? 'outsideTangent' : 'outsideApex' },
    insideRadiusMm: null,
    override: null,
    sideEdges: 'trimmed',
  };
}

/** A rectangle as a counter-clockwise loop with edges "e1" (bottom) to "e4" (left). */
export function rectangleLoop(id: string, lowerLeft: Point, upperRight: Point): OutlineLoop {
  return {
    id,
    edges: [
      { id: 'e1', start: lowerLeft, bulge: 0 },
      { id: 'e2', start: { x: upperRight.x, y: lowerLeft.y }, bulge: 0 },
      { id: 'e3', start: upperRight, bulge: 0 },
      { id: 'e4', start: { x: lowerLeft.x, y: upperRight.y }, bulge: 0 },
    ],
  };
}

function sized(name: string, valueMm: number): number {
  if (!Number.isFinite(valueMm) || valueMm <= 0) throw new RangeError(`${name} is ${valueMm}; it must be above 0`);
  return valueMm;
}

function angled(bendAngleDeg: number): number {
  if (!(bendAngleDeg >= 5 && bendAngleDeg <= 165)) {
    throw new RangeError(`bendAngleDeg is ${bendAngleDeg}; it must lie between 5 and 165`);
  }
  return bendAngleDeg;
}
