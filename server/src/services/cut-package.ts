import type { WorkshopScope } from '../database/workshop-scope';
import type { RevisionFile } from '../models/revision-file';

type Stock = RevisionFile['stock'];

async function fileOf(
  scope: WorkshopScope,
  revisionId: string,
  kind: 'dxf' | 'drawing',
  stock: Stock,
): Promise<string> {
  const file = await scope.rows.revisionFiles.findOne({ revisionId, kind, stock });
  if (file === null) throw new Error(`revision ${revisionId} has no ${kind} for its ${stock} sheet`);
  return file.storedAs;
}

/** Where the cut file of a revision is kept. Released files never change, so the shop gets the one it priced. */
export const cutFileOf = (scope: WorkshopScope, revisionId: string, stock: Stock): Promise<string> =>
  fileOf(scope, revisionId, 'dxf', stock);

/** Where the drawing of a revision is kept. */
export const drawingOf = (scope: WorkshopScope, revisionId: string, stock: Stock): Promise<string> =>
  fileOf(scope, revisionId, 'drawing', stock);
