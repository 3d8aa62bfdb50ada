import type { TopoDS_Shape } from 'replicad-opencascadejs';
import type { OpenCascade } from './open-cascade';
import { SolidBuildError } from './build-solid';

const FILE = 'part.step';

/**
 * A solid as a STEP file (ISO 10303-21, schema AP242) in mm. The same solid, name and moment give the same bytes: the modeller's own name and clock in
 * the header are replaced.
 * @param name of the part and its revision
 * @param stamp moment to state, ISO 8601
 */
export function writeStep(oc: OpenCascade, solid: TopoDS_Shape, name: string, stamp: string): string {
  // Known to the modeller only once it has made a writer.
  const writer = new oc.STEPControl_Writer();
  if (!oc.Interface_Static.SetCVal('write.step.schema', 'AP242DIS')) {
    throw new SolidBuildError('The modeller does not know the schema AP242.');
  }
  const session = new oc.Message_ProgressRange();
  writer.Transfer(solid, oc.STEPControl_StepModelType.STEPControl_AsIs, true, session);
  writer.Write(FILE);
  const text = oc.FS.readFile(FILE, { encoding: 'utf8' });
  oc.FS.unlink(FILE);
  if (typeof text !== 'string' || !text.startsWith('ISO-10303-21;')) {
    throw new SolidBuildError('The solid could not be written.');
  }
  const called = asStepString(name);
  return text
    .replace(/FILE_NAME\('[^']*',\s*'[^']*'/u, `FILE_NAME('${called}','${stamp}'`)
    .replace("('Author')", "('Foldwright')")
    .replace(/PRODUCT\('[^']*',\s*'[^']*'/u, `PRODUCT('${called}','${called}'`);
}

/** A string as STEP writes it: apostrophes doubled, what is not plain ASCII left out. */
function asStepString(text: string): string {
  return text
    .replace(/[^\x20-\x7e]/gu, '')
    .replace(/\\/gu, '')
    .replace(/'/gu, "''");
}
