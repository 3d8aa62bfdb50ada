import type { TopoDS_Shape } from 'replicad-opencascadejs';
import type { OpenCascade } from './open-cascade';

/** What the solid modeller makes of a solid, mm. */
export interface SolidMeasures {
  readonly volumeMm3: number;
  readonly surfaceMm2: number;
  readonly box: { readonly min: readonly [number, number, number]; readonly max: readonly [number, number, number] };
}

/** Relative error at which the modeller stops integrating. */
const INTEGRATION_ERROR = 1e-12;

export function measureSolid(oc: OpenCascade, solid: TopoDS_Shape): SolidMeasures {
  const volume = new oc.GProp_GProps();
  oc.BRepGProp.VolumeProperties(solid, volume, INTEGRATION_ERROR, true, false);
  const surface = new oc.GProp_GProps();
  oc.BRepGProp.SurfaceProperties(solid, surface, INTEGRATION_ERROR, false);
  const box = new oc.Bnd_Box();
  oc.BRepBndLib.AddOptimal(solid, box, false, false);
  return {
    volumeMm3: volume.Mass(),
    surfaceMm2: surface.Mass(),
    box: {
      min: [box.GetXMin(), box.GetYMin(), box.GetZMin()],
      max: [box.GetXMax(), box.GetYMax(), box.GetZMax()],
    },
  };
}
