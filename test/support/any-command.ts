import * as fc from 'fast-check';
import type { BendDeclaration } from '@foldwright/shared/bending/layout';
import { applyCommand, applyCommands } from '@foldwright/shared/part/apply-command';
import { CommandRefusal } from '@foldwright/shared/part/command-refusal';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { starterDocument } from '@foldwright/shared/part/starter-document';

/** A U with a rounded corner, a cut-out, two holes and a slot. */
export const furnishedBracket: PartDocument = applyCommands(
  starterDocument({
    shape: 'u-bracket',
    baseMm: 80,
    leftFlangeMm: 30,
    rightFlangeMm: 25,
    widthMm: 60,
    bendAngleDeg: 90,
  }),
  [
    { kind: 'roundCorner', edgeId: 'e1', radiusMm: 6, newEdgeId: 'r1' },
    {
      kind: 'addCutout',
      loop: {
        id: 'c1',
        edges: [
          { id: 'c1a', start: { x: 60, y: 20 }, bulge: 0 },
          { id: 'c1b', start: { x: 60, y: 40 }, bulge: 0 },
          { id: 'c1c', start: { x: 80, y: 30 }, bulge: -0.3 },
        ],
      },
    },
    {
      kind: 'addFeature',
      feature: { kind: 'hole', id: 'h1', centre: { x: 40, y: 20 }, purpose: { kind: 'tapped', thread: 'M6' } },
    },
    {
      kind: 'addFeature',
      feature: { kind: 'slot', id: 's1', from: { x: 95, y: 20 }, to: { x: 105, y: 20 }, widthMm: 6 },
    },
    {
      kind: 'addFeature',
      feature: { kind: 'hole', id: 'h2', centre: { x: 45, y: 40 }, purpose: { kind: 'plain', diameterMm: 8 } },
    },
  ],
);

const edgeId = fc.constantFrom('e1', 'e2', 'e3', 'e4', 'r1', 'c1a', 'c1b', 'c1c', 'n1', 'n2', 'missing');
const newId = fc.constantFrom('n1', 'n2', 'n3', 'n4', 'h1');
const featureId = fc.constantFrom('h1', 'h2', 's1', 'n1', 'n3');
const bendId = fc.constantFrom('b1', 'b2', 'n2');
const lengthMm = fc.double({ min: 0.1, max: 120, noNaN: true });
const offsetMm = fc.double({ min: -60, max: 60, noNaN: true });
const point = fc.record({
  x: fc.double({ min: -20, max: 160, noNaN: true }),
  y: fc.double({ min: -20, max: 90, noNaN: true }),
});
const bulge = fc.constantFrom(0, 0.2, -0.4, 1);
const stock = fc.record({
  materialId: fc.constantFrom('dc01', 'ss304', 'al6061t6'),
  thicknessMm: fc.constantFrom(0.8, 1.5, 3),
  grainDirectionDeg: fc.constantFrom(null, 0, 90),
  vOpeningMm: fc.constantFrom(null, 16),
});
const purpose = fc.oneof(
  fc.record({
    kind: fc.constant('clearance' as const),
    thread: fc.constantFrom('M3', 'M6', 'M9'),
    fit: fc.constantFrom('close', 'medium', 'coarse'),
  }),
  fc.record({ kind: fc.constant('plain' as const), diameterMm: lengthMm }),
);
const bend = fc
  .record({ id: bendId, x: fc.double({ min: 5, max: 130, noNaN: true }), angle: fc.constantFrom(30, 90, 135, 180) })
  .map(({ id, x, angle }): BendDeclaration => ({
    id,
    line: { from: { x, y: 0 }, to: { x, y: 60 } },
    bendAngleDeg: angle,
    direction: 'away',
    lengths: { from: 'reference', reference: 'tangent' },
    insideRadiusMm: null,
    override: null,
    sideEdges: 'trimmed',
  }));
const role = fc.constantFrom('trial' as const, 'production' as const);

/** Every kind of command but revert, with ids that may or may not be there. */
export const anyCommand: fc.Arbitrary<PartCommand> = fc.oneof(
  fc.record({
    kind: fc.constant('setAssembly' as const),
    assembly: fc.constantFrom(null, {
      finishId: 'powder-moss',
      hardwareSet: 'after-coating',
      seat: { material: 'steel', isWet: true, corners: [{ bendId: 'b1', radiusMm: 0 }] },
      neighbours: [{ kind: 'box', id: 'n4', name: 'tank', min: { x: 0, y: 0, z: 40 }, max: { x: 20, y: 20, z: 60 } }],
      bolts: { featureIds: ['h1', 'h2'], placeHalfWidthMm: 0.2, wantedChance: 0.95 },
    } as const),
  }),
  fc.record({
    kind: fc.constant('setMarks' as const),
    marks: fc.constantFrom([], [{ id: 'n3', text: 'FW 1 A', at: { x: 35, y: 5 }, heightMm: 4, turnDeg: 0 }]),
  }),
  fc.record({ kind: fc.constant('setStock' as const), role, stock }),
  fc.record({
    kind: fc.constant('setTemplate' as const),
    template: fc.constantFrom(null, {
      kind: 'card',
      thicknessMm: 0.5,
      reading: { readOn: 'crease', bearingFace: 'A', hinge: { kind: 'middle' } },
    } as const),
  }),
  fc.record({
    kind: fc.constant('setCalibration' as const),
    scaleX: fc.constantFrom(1, 1.01),
    scaleY: fc.constantFrom(1, 0.99),
  }),
  fc.record({
    kind: fc.constant('replaceLayout' as const),
    layout: fc.constant(furnishedBracket.layout),
    origin: fc.constantFrom('trace' as const, 'starter' as const),
  }),
  fc.record({ kind: fc.constant('moveVertex' as const), edgeId, to: point }),
  fc.record({
    kind: fc.constant('insertVertex' as const),
    edgeId,
    newEdge: fc.record({ id: newId, start: point, bulge }),
  }),
  fc.record({ kind: fc.constant('removeVertex' as const), edgeId }),
  fc.record({
    kind: fc.constant('setEdgeLength' as const),
    edgeId,
    lengthMm,
    hold: fc.constantFrom('start' as const, 'end' as const),
  }),
  fc.record({ kind: fc.constant('slideEdge' as const), edgeId, byMm: offsetMm }),
  fc.record({ kind: fc.constant('setEdgeBulge' as const), edgeId, bulge }),
  fc.record({ kind: fc.constant('roundCorner' as const), edgeId, radiusMm: lengthMm, newEdgeId: newId }),
  fc.record({
    kind: fc.constant('addCutout' as const),
    loop: fc.record({ id: newId }).map(({ id }) => ({
      id,
      edges: [
        { id: `${id}x`, start: { x: 50, y: 10 }, bulge: 1 },
        { id: `${id}y`, start: { x: 55, y: 10 }, bulge: 1 },
      ],
    })),
  }),
  fc.record({ kind: fc.constant('removeCutout' as const), loopId: fc.constantFrom('c1', 'n1') }),
  fc.record({
    kind: fc.constant('addFeature' as const),
    feature: fc.record({ kind: fc.constant('hole' as const), id: newId, centre: point, purpose }),
  }),
  fc.record({ kind: fc.constant('moveFeature' as const), featureId, by: point }),
  fc.record({ kind: fc.constant('setHolePurpose' as const), featureId, purpose }),
  fc.record({ kind: fc.constant('setSlotSize' as const), featureId, lengthMm, widthMm: lengthMm }),
  fc.record({ kind: fc.constant('removeFeature' as const), featureId }),
  fc.record({ kind: fc.constant('addBend' as const), bend }),
  bend.map((changed): PartCommand => ({ kind: 'changeBend', bendId: changed.id, bend: changed })),
  fc.record({ kind: fc.constant('removeBend' as const), bendId }),
  fc.record({
    kind: fc.constant('setReliefs' as const),
    reliefs: fc.record({
      mode: fc.constantFrom('automatic' as const, 'none' as const),
      widthMm: fc.constantFrom(null, 2),
      depthMm: fc.constant(null),
      shape: fc.constant('obround' as const),
    }),
  }),
  fc.record({ kind: fc.constant('setBaseAnchor' as const), to: point }),
  fc.record({
    kind: fc.constant('setMaking' as const),
    making: fc.record({
      bender: fc.constantFrom('own-brake' as const, 'outside' as const),
      statement: fc.constant('formed-sizes-rule' as const),
    }),
  }),
  fc.record({
    kind: fc.constant('setDeclaredUses' as const),
    uses: fc.subarray(['vehicle', 'heat', 'seat'] as const),
  }),
);

/** Applies what can be applied; a refusal leaves the document as it is, anything else fails the test. */
export function tryApply(document: PartDocument, next: PartCommand): PartDocument {
  try {
    return applyCommand(document, next);
  } catch (error) {
    if (error instanceof CommandRefusal) return document;
    throw error;
  }
}
