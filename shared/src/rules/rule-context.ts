import type { Development, DevelopmentProblem, Panel } from '../bending/development';
import { pointInLoop } from '../geometry/loop';
import type { Point } from '../geometry/point';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { invert, moveDirection, movePoint } from '../geometry/transform';
import type { PartCommand } from '../part/commands';
import type { PartDocument, SheetStock, StockRole } from '../part/part-document';
import type { SheetMaterial } from '../stock/material';

/** What every rule is given. */
export interface RuleContext {
  readonly document: PartDocument;
  readonly role: StockRole;
  readonly sheet: SheetStock;
  /** Null when the tables do not know the material. */
  readonly material: SheetMaterial | null;
  /** E1, H1, B1, ... by id. */
  readonly names: ReadonlyMap<string, string>;
  /** Null when the part cannot be developed; `problems` then says why. */
  readonly development: Development | null;
  readonly problems: readonly DevelopmentProblem[];
  /** Tries commands out; null where no mends are wanted, as while one is being tried, so that it comes to an end. */
  readonly tryOut: TryOut | null;
}

/** What commands would lead to in the same sheet; null when the document refuses them or enough has been tried. */
export type TryOut = (commands: readonly PartCommand[]) => {
  /** Ids of the findings that there would be. */
  readonly findingIds: ReadonlySet<string>;
  /** Whether something that cannot be made would be new. */
  readonly addsBlocker: boolean;
} | null;

/** Name of a thing, or its id when it has none. */
export function nameOf(context: RuleContext, id: string): string {
  return context.names.get(id) ?? id;
}

/** "H5", "H5 and H6", "H5, H6 and H7". */
export function listNames(names: readonly string[]): string {
  if (names.length < 2) return names[0] ?? '';
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1] ?? ''}`;
}

/** The same for lists that may be long: "E1, E2, E3 and 12 more". */
export function listSome(names: readonly string[]): string {
  if (names.length <= LISTED) return listNames(names);
  return `${names.slice(0, LISTED - 1).join(', ')} and ${names.length - LISTED + 1} more`;
}

const LISTED = 6;

/** Panel of the flat pattern that a point lies in; null inside a bend zone or off the sheet. */
export function panelAt(development: Development, flatPoint: Point): Panel | null {
  return development.panels.find((panel) => pointInLoop(flatPoint, panel.outer, COINCIDENT_MM) !== 'outside') ?? null;
}

/** A point of the flat pattern with the layout point it came from; inside bend zones the parent's side is taken. */
export function placeOfFlat(development: Development, flat: Point): { readonly layout: Point; readonly flat: Point } {
  const panel = panelAt(development, flat) ?? development.panels[0];
  return { flat, layout: panel === undefined ? flat : movePoint(invert(panel.placement), flat) };
}

/** A shift in the flat pattern as the shift in the layout that brings it about, for a thing that lies at `flat`. */
export function layoutShift(development: Development, flat: Point, by: Point): Point {
  const panel = panelAt(development, flat) ?? development.panels[0];
  return panel === undefined ? by : moveDirection(invert(panel.placement), by);
}

/** A layout point with its place in the flat pattern; the same point when there is no flat pattern. */
export function placeOfLayout(context: RuleContext, layout: Point): { readonly layout: Point; readonly flat: Point } {
  const panels = context.development?.panels ?? [];
  const panel = panels.find(({ layoutOuter }) => pointInLoop(layout, layoutOuter, COINCIDENT_MM) !== 'outside');
  return { layout, flat: panel === undefined ? layout : movePoint(panel.placement, layout) };
}
