import type { Mesh } from '@foldwright/shared/bending/development';
import {
  AmbientLight,
  BufferAttribute,
  BufferGeometry,
  CircleGeometry,
  CylinderGeometry,
  DirectionalLight,
  Group,
  LineBasicMaterial,
  LineSegments,
  type Material,
  Matrix4,
  Mesh as ThreeMesh,
  MeshBasicMaterial,
  MeshLambertMaterial,
  NotEqualStencilFunc,
  type Object3D,
  OrthographicCamera,
  ReplaceStencilOp,
  Scene,
  Vector3,
  WebGLRenderer,
} from 'three';
import type { TurntableColours } from './turntable-colours';

const DEG = Math.PI / 180;
/** Seen from so far above the bench, as parts in lists are. */
const RISE_DEG = 33;
const TO_LIGHT = new Vector3(-0.4, -0.5, 1.1);
/** Ticks around the disc: one every 15 degrees, a long one every 45. */
const TICK_STEP_DEG = 15;
/** The disc is a little larger than what stands on it. */
const DISC_MARGIN = 1.16;

/**
 * The disc on the bench with the part on it, drawn when something changed and never by itself. World axes are the part's:
 * x and y in the base panel, z up from it, mm.
 * @throws Error when the browser offers no WebGL
 */
export class TurntableScene {
  private readonly renderer: WebGLRenderer;
  private readonly scene = new Scene();
  private readonly camera = new OrthographicCamera();
  private readonly table = new Group();
  private readonly part = new Group();
  private disc = new Group();
  private readonly metal = new MeshLambertMaterial({
    polygonOffset: true,
    polygonOffsetFactor: 1,
    polygonOffsetUnits: 1,
  });
  private readonly scribe = new LineBasicMaterial({ transparent: true, opacity: 0.8 });
  private readonly shade = new MeshBasicMaterial({
    transparent: true,
    opacity: 0.2,
    depthWrite: false,
    // Triangles of the shadow overlap; each pixel is darkened once.
    stencilWrite: true,
    stencilRef: 1,
    stencilFunc: NotEqualStencilFunc,
    stencilZPass: ReplaceStencilOp,
  });
  private discRadiusMm = 0;
  private frame = 0;
  private aspect = 1;
  private colours: TurntableColours | null = null;

  constructor(canvas: HTMLCanvasElement) {
    this.renderer = new WebGLRenderer({ canvas, antialias: true, alpha: true, stencil: true });
    this.renderer.setClearAlpha(0);
    this.scene.add(new AmbientLight(0xffffff, 1.75));
    const sun = new DirectionalLight(0xffffff, 1.9);
    sun.position.copy(TO_LIGHT);
    this.scene.add(sun, this.table);
    this.table.add(this.part, this.disc);
  }

  /** Puts the part on the disc as it is folded now. The disc only grows, so that folding doesn't move it. */
  show(mesh: Mesh, reachMm: number): void {
    dispose(this.part);
    this.part.clear();
    const geometry = new BufferGeometry();
    geometry.setAttribute('position', new BufferAttribute(new Float32Array(mesh.positions), 3));
    geometry.setAttribute('normal', new BufferAttribute(new Float32Array(mesh.normals), 3));
    geometry.setIndex([...mesh.indices]);
    geometry.computeBoundingBox();
    const lines = new BufferGeometry();
    lines.setAttribute('position', new BufferAttribute(new Float32Array(mesh.edges), 3));
    const box = geometry.boundingBox;
    const groundMm = box === null ? 0 : box.min.z;
    this.part.add(new ThreeMesh(geometry, this.metal), new LineSegments(lines, this.scribe));
    this.part.add(shadowOf(geometry, groundMm, this.shade, this.table.rotation.z));
    this.placeDisc(reachMm, groundMm);
    this.draw();
  }

  /** Turns the disc, degrees counter-clockwise seen from above. */
  turn(angleDeg: number): void {
    this.table.rotation.z = angleDeg * DEG;
    const shadow = this.part.children.find((child) => child.name === 'shadow');
    const body = this.part.children[0];
    if (shadow !== undefined && body instanceof ThreeMesh)
      throwShadow(shadow, this.disc.position.z, this.table.rotation.z);
    this.draw();
  }

  paint(colours: TurntableColours): void {
    this.colours = colours;
    this.metal.color.set(colours.metal);
    this.scribe.color.set(colours.scribe);
    this.shade.color.set(colours.shade);
    const { discRadiusMm } = this;
    this.discRadiusMm = 0;
    if (discRadiusMm > 0) this.placeDisc(discRadiusMm / DISC_MARGIN, this.disc.position.z);
    this.draw();
  }

  /** Fits the drawing into a place of so many CSS pixels. */
  resize(widthPx: number, heightPx: number, pixelRatio: number): void {
    this.renderer.setPixelRatio(pixelRatio);
    this.renderer.setSize(widthPx, heightPx, false);
    this.aim(widthPx / heightPx);
    this.draw();
  }

  dispose(): void {
    cancelAnimationFrame(this.frame);
    dispose(this.scene);
    this.renderer.dispose();
  }

  private aim(aspect: number): void {
    this.aspect = aspect;
    const radius = Math.max(1, this.discRadiusMm) * 1.06;
    const rise = RISE_DEG * DEG;
    // The disc is an ellipse on the screen; the part stands up from it.
    const halfHeight = radius * (Math.sin(rise) + 0.24);
    const half = Math.max(radius / aspect, halfHeight);
    this.camera.left = -half * aspect;
    this.camera.right = half * aspect;
    this.camera.top = half;
    this.camera.bottom = -half;
    this.camera.near = -20 * radius;
    this.camera.far = 20 * radius;
    this.camera.up.set(0, 0, 1);
    const lift = radius * 0.16 + this.disc.position.z;
    this.camera.position.set(0, -Math.cos(rise) * radius, Math.sin(rise) * radius + lift);
    this.camera.lookAt(0, 0, lift);
    this.camera.updateProjectionMatrix();
  }

  private placeDisc(reachMm: number, groundMm: number): void {
    const radius = reachMm * DISC_MARGIN;
    this.disc.position.z = groundMm;
    if (Math.abs(radius - this.discRadiusMm) < 0.5 || this.colours === null) {
      this.aim(this.aspect);
      return;
    }
    this.discRadiusMm = radius;
    dispose(this.disc);
    this.table.remove(this.disc);
    this.disc = discOf(radius, this.colours);
    this.disc.position.z = groundMm;
    this.table.add(this.disc);
    this.aim(this.aspect);
  }

  private draw(): void {
    cancelAnimationFrame(this.frame);
    this.frame = requestAnimationFrame(() => {
      this.renderer.render(this.scene, this.camera);
      // Tells whoever looks on from outside that something was drawn.
      const { dataset } = this.renderer.domElement;
      dataset['frames'] = String(Number(dataset['frames'] ?? '0') + 1);
    });
  }
}

function discOf(radius: number, colours: TurntableColours): Group {
  const group = new Group();
  const thickness = radius * 0.05;
  const rim = new ThreeMesh(
    new CylinderGeometry(radius, radius, thickness, 96),
    new MeshBasicMaterial({ color: colours.rim }),
  );
  rim.rotation.x = 90 * DEG;
  rim.position.z = -thickness / 2 - radius * 0.004;
  const top = new ThreeMesh(new CircleGeometry(radius, 96), new MeshBasicMaterial({ color: colours.disc }));
  top.position.z = -0.02;
  const ticks: number[] = [];
  for (let angle = 0; angle < 360; angle += TICK_STEP_DEG) {
    const [cos, sin] = [Math.cos(angle * DEG), Math.sin(angle * DEG)];
    const inner = angle % 45 === 0 ? 0.9 : 0.94;
    ticks.push(cos * radius * inner, sin * radius * inner, 0, cos * radius * 0.985, sin * radius * 0.985, 0);
  }
  const lines = new BufferGeometry();
  lines.setAttribute('position', new BufferAttribute(new Float32Array(ticks), 3));
  group.add(
    rim,
    top,
    new LineSegments(lines, new LineBasicMaterial({ color: colours.ticks, transparent: true, opacity: 0.7 })),
  );
  return group;
}

function shadowOf(geometry: BufferGeometry, groundMm: number, material: Material, turnRad: number): Object3D {
  const shadow = new ThreeMesh(geometry, material);
  shadow.name = 'shadow';
  shadow.matrixAutoUpdate = false;
  shadow.renderOrder = 1;
  throwShadow(shadow, groundMm, turnRad);
  return shadow;
}

/** Flattens the part onto the disc along the light, which stands still while the disc turns. */
function throwShadow(shadow: Object3D, groundMm: number, turnRad: number): void {
  const light = TO_LIGHT.clone().applyAxisAngle(new Vector3(0, 0, 1), -turnRad);
  const [x, y] = [light.x / light.z, light.y / light.z];
  shadow.matrix.copy(
    new Matrix4().set(1, 0, -x, x * groundMm, 0, 1, -y, y * groundMm, 0, 0, 0, groundMm + 0.01, 0, 0, 0, 1),
  );
  shadow.matrixWorldNeedsUpdate = true;
}

function dispose(root: Object3D): void {
  root.traverse((child) => {
    if (child instanceof ThreeMesh || child instanceof LineSegments) child.geometry.dispose();
  });
}
