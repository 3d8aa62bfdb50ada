import type { BendDeclaration, Feature, HolePurpose, Layout, OutlineLoop } from '../bending/layout';
import type { Point } from '../geometry/point';
import { loopFromBulges, signedArea } from '../geometry/loop';
import { add, distance, scale, subtract, unit } from '../geometry/vector';
import { findHoleDiameterMm } from '../stock/hole-diameter';
import { applyRevert } from './slices';
import { CommandRefusal } from './command-refusal';
import type { PartCommand } from './commands';
import { assertInvariants } from './invariants';
import {
  insertVertex,
  moveVertex,
  removeVertex,
  roundCorner,
  setEdgeBulge,
  setEdgeLength,
  slideEdge,
} from './outline-edits';
import type { PartDocument } from './part-document';
import { rescaleLayout } from './rescale-layout';
import { withAssembly, withMarks } from './with-optional';

/**
 * Applies one command. Pure and exact: the same document and command always give the same document, in the browser and
 * on the server, because every new id comes inside the command.
 * @returns the changed document; what the command does not touch is shared with the old one
 * @throws CommandRefusal when it cannot be applied or would break an invariant; the old document stays as it was
 */
export function applyCommand(document: PartDocument, command: PartCommand): PartDocument {
  const changed = change(document, command);
  assertInvariants(changed);
  return changed;
}

/** Applies commands in order; all or none. @throws CommandRefusal of the first that cannot be applied */
export function applyCommands(document: PartDocument, commands: readonly PartCommand[]): PartDocument {
  return commands.reduce(applyCommand, document);
}

function change(document: PartDocument, command: PartCommand): PartDocument {
  switch (command.kind) {
    case 'setStock':
      return { ...document, stocks: { ...document.stocks, [command.role]: command.stock } };
    case 'setTemplate':
      return { ...document, template: command.template };
    case 'setMaking':
      return { ...document, making: command.making };
    case 'setDeclaredUses':
      return { ...document, declaredUses: command.uses };
    case 'setAssembly':
      return withAssembly(document, command.assembly);
    case 'setMarks':
      return withMarks(document, command.marks);
    case 'setCalibration': {
      const { scaleX, scaleY } = command;
      const factor = { x: scaleX / document.calibration.scaleX, y: scaleY / document.calibration.scaleY };
      return { ...document, calibration: { scaleX, scaleY }, layout: rescaleLayout(document.layout, factor) };
    }
    case 'replaceLayout':
      return { ...document, layout: command.layout };
    case 'revert':
      return applyRevert(document, command.changes);
    default: {
      const layout = changeLayout(document.layout, command);
      return layout === document.layout ? document : { ...document, layout };
    }
  }
}

type LayoutCommand = Exclude<
  PartCommand,
  {
    readonly kind:
      | 'setStock'
      | 'setTemplate'
      | 'setMaking'
      | 'setDeclaredUses'
      | 'setAssembly'
      | 'setMarks'
      | 'setCalibration'
      | 'replaceLayout'
      | 'revert';
  }
>;

function changeLayout(layout: Layout, command: LayoutCommand): Layout {
  switch (command.kind) {
    case 'moveVertex':
      return changeLoop(layout, command.edgeId, (loop) => moveVertex(loop, command.edgeId, command.to));
    case 'insertVertex':
      return changeLoop(layout, command.edgeId, (loop) => insertVertex(loop, command.edgeId, command.newEdge));
    case 'removeVertex':
      return changeLoop(layout, command.edgeId, (loop) => removeVertex(loop, command.edgeId));
    case 'setEdgeLength':
      return changeLoop(layout, command.edgeId, (loop) =>
        setEdgeLength(loop, command.edgeId, command.lengthMm, command.hold),
      );
    case 'slideEdge':
      return changeLoop(layout, command.edgeId, (loop, isOuter) => {
        const isCounterClockwise = signedArea(loopFromBulges(loop.edges)) > 0;
        return slideEdge(loop, command.edgeId, command.byMm, isCounterClockwise === isOuter ? 'left' : 'right');
      });
    case 'setEdgeBulge':
      return changeLoop(layout, command.edgeId, (loop) => setEdgeBulge(loop, command.edgeId, command.bulge));
    case 'roundCorner':
      return changeLoop(layout, command.edgeId, (loop) =>
        roundCorner(loop, command.edgeId, command.radiusMm, command.newEdgeId),
      );
    case 'addCutout':
      return { ...layout, cutouts: [...layout.cutouts, command.loop] };
    case 'removeCutout':
      return { ...layout, cutouts: without(layout.cutouts, command.loopId, 'cut-out') };
    case 'addFeature':
      assertKnownThread(command.feature);
      return { ...layout, features: [...layout.features, command.feature] };
    case 'moveFeature':
      return changeFeature(layout, command.featureId, (feature) => movedFeature(feature, command.by));
    case 'setHolePurpose':
      return changeFeature(layout, command.featureId, (feature) => withPurpose(feature, command.purpose));
    case 'setSlotSize':
      return changeFeature(layout, command.featureId, (feature) =>
        withSlotSize(feature, command.lengthMm, command.widthMm),
      );
    case 'removeFeature':
      return { ...layout, features: without(layout.features, command.featureId, 'hole or slot') };
    case 'addBend':
      return { ...layout, bends: [...layout.bends, command.bend] };
    case 'changeBend':
      return { ...layout, bends: changedBend(layout.bends, command.bendId, command.bend) };
    case 'removeBend':
      return { ...layout, bends: without(layout.bends, command.bendId, 'bend') };
    case 'setReliefs':
      return { ...layout, reliefs: command.reliefs };
    case 'setBaseAnchor':
      return { ...layout, baseAnchor: command.to };
  }
}

function changeLoop(
  layout: Layout,
  edgeId: string,
  edit: (loop: OutlineLoop, isOuter: boolean) => OutlineLoop,
): Layout {
  const holds = (loop: OutlineLoop) => loop.edges.some((edge) => edge.id === edgeId);
  if (holds(layout.outer)) return { ...layout, outer: edit(layout.outer, true) };
  const at = layout.cutouts.findIndex(holds);
  const cutout = layout.cutouts[at];
  if (cutout === undefined) throw new CommandRefusal('unknownEntity', 'That edge is not there any more.', [edgeId]);
  return { ...layout, cutouts: layout.cutouts.with(at, edit(cutout, false)) };
}

function changeFeature(layout: Layout, featureId: string, edit: (feature: Feature) => Feature): Layout {
  const at = layout.features.findIndex((feature) => feature.id === featureId);
  const feature = layout.features[at];
  if (feature === undefined) {
    throw new CommandRefusal('unknownEntity', 'That hole or slot is not there any more.', [featureId]);
  }
  return { ...layout, features: layout.features.with(at, edit(feature)) };
}

function movedFeature(feature: Feature, by: Point): Feature {
  return feature.kind === 'hole'
    ? { ...feature, centre: add(feature.centre, by) }
    : { ...feature, from: add(feature.from, by), to: add(feature.to, by) };
}

function withPurpose(feature: Feature, purpose: HolePurpose): Feature {
  if (feature.kind !== 'hole') {
    throw new CommandRefusal('unknownEntity', 'A slot has a size, not a purpose.', [feature.id]);
  }
  const changed = { ...feature, purpose };
  assertKnownThread(changed);
  return changed;
}

/** `lengthMm` is the overall length, over both end radii; the middle and the direction stay. */
function withSlotSize(feature: Feature, lengthMm: number, widthMm: number): Feature {
  if (feature.kind !== 'slot') throw new CommandRefusal('unknownEntity', 'That is a hole, not a slot.', [feature.id]);
  if (!(lengthMm > widthMm)) {
    throw new CommandRefusal('impossibleSize', 'A slot is longer than it is wide; otherwise it is a hole.', [
      feature.id,
    ]);
  }
  const middle = scale(add(feature.from, feature.to), 0.5);
  const span = subtract(feature.to, feature.from);
  const direction = distance(feature.from, feature.to) > 0 ? unit(span) : { x: 1, y: 0 };
  const half = scale(direction, (lengthMm - widthMm) / 2);
  return { ...feature, from: subtract(middle, half), to: add(middle, half), widthMm };
}

function changedBend(
  bends: readonly BendDeclaration[],
  bendId: string,
  bend: BendDeclaration,
): readonly BendDeclaration[] {
  const at = bends.findIndex((candidate) => candidate.id === bendId);
  if (at < 0) throw new CommandRefusal('unknownEntity', 'That bend is not there any more.', [bendId]);
  if (bend.id !== bendId)
    throw new CommandRefusal('duplicateId', 'A bend keeps its id when it changes.', [bendId, bend.id]);
  return bends.with(at, bend);
}

function without<Item extends { readonly id: string }>(
  items: readonly Item[],
  id: string,
  what: string,
): readonly Item[] {
  const rest = items.filter((item) => item.id !== id);
  if (rest.length === items.length)
    throw new CommandRefusal('unknownEntity', `That ${what} is not there any more.`, [id]);
  return rest;
}

function assertKnownThread(feature: Feature): void {
  if (feature.kind === 'hole' && findHoleDiameterMm(feature.purpose) === null) {
    const thread = 'thread' in feature.purpose ? feature.purpose.thread : '';
    throw new CommandRefusal('unknownThread', `The tables have no ${feature.purpose.kind} hole for ${thread}.`, [
      feature.id,
    ]);
  }
}
