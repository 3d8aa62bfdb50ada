import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import type { Feature } from '@foldwright/shared/bending/layout';
import type { Assembly, Neighbour } from '@foldwright/shared/part/assembly';
import { FINISHES } from '@foldwright/shared/stock/finishes';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';

const NOTHING_SAID: Assembly = {
  finishId: 'bare',
  hardwareSet: 'after-coating',
  seat: null,
  neighbours: [],
  bolts: null,
};
/** Bolts in a drilled frame sit this far off their places, common practice, no source; and start with this chance in good work. */
const USUAL_BOLTS = { placeHalfWidthMm: 0.25, wantedChance: 0.95 };
const SEATS = ['steel', 'stainless', 'aluminium', 'other'] as const;
const SETTINGS = [
  { value: 'after-coating', words: 'after coating' },
  { value: 'before-coating', words: 'before coating' },
] as const;
const CORNERS = [
  { end: 'min', words: 'from' },
  { end: 'max', words: 'to' },
] as const;
const AXES = ['x', 'y', 'z'] as const;

type Box = Extract<Neighbour, { readonly kind: 'box' }>;

/** What the part is finished with and put on, as far as checks of assembling depend on it. */
@Component({
  selector: 'fw-assembly-form',
  imports: [MatButtonModule],
  templateUrl: './assembly-form.html',
  styleUrl: './use-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AssemblyForm {
  readonly assembly = input.required<Assembly | undefined>();
  readonly features = input.required<readonly Feature[]>();
  readonly disabled = input(false);

  readonly changed = output<Assembly>();

  protected readonly finishes = FINISHES.map(({ id }) => ({ id, words: finishWords(id) }));
  protected readonly seats = SEATS;
  protected readonly settings = SETTINGS;
  protected readonly corners = CORNERS;
  protected readonly axes = AXES;
  protected readonly said = computed(() => this.assembly() ?? NOTHING_SAID);
  protected readonly boxes = computed(() => this.said().neighbours.filter((one): one is Box => one.kind === 'box'));
  /** Holes and slots that bolts go through. */
  protected readonly boltHoles = computed(() =>
    this.features()
      .filter((feature) => feature.kind === 'slot' || feature.purpose.kind === 'clearance')
      .map(({ id }) => id),
  );
  protected readonly chancePercent = computed(() => Math.round((this.said().bolts?.wantedChance ?? 0) * 100));

  protected setFinish(finishId: string): void {
    this.say({ finishId });
  }

  protected setHardware(value: string): void {
    const setting = SETTINGS.find((one) => one.value === value);
    if (setting !== undefined) this.say({ hardwareSet: setting.value });
  }

  protected setSeat(value: string): void {
    const material = SEATS.find((seat) => seat === value);
    const { seat } = this.said();
    const { isWet, corners } = seat ?? { isWet: false, corners: [] };
    this.say({ seat: material === undefined ? null : { material, isWet, corners } });
  }

  protected setWet(isWet: boolean): void {
    const { seat } = this.said();
    if (seat !== null) this.say({ seat: { ...seat, isWet } });
  }

  protected toggleBolts(): void {
    const featureIds = this.boltHoles();
    this.say({ bolts: this.said().bolts === null ? { featureIds, ...USUAL_BOLTS } : null });
  }

  protected setPlace(typed: string): void {
    const { bolts } = this.said();
    const placeHalfWidthMm = Number(typed);
    if (bolts !== null && placeHalfWidthMm >= 0 && placeHalfWidthMm <= 20) {
      this.say({ bolts: { ...bolts, placeHalfWidthMm } });
    }
  }

  protected setChance(typed: string): void {
    const { bolts } = this.said();
    const wantedChance = Number(typed) / 100;
    if (bolts !== null && wantedChance > 0 && wantedChance < 1) this.say({ bolts: { ...bolts, wantedChance } });
  }

  protected addBox(): void {
    const box: Box = {
      kind: 'box',
      id: `near-${crypto.randomUUID().slice(0, 8)}`,
      name: `neighbour ${this.said().neighbours.length + 1}`,
      min: { x: 0, y: 0, z: -20 },
      max: { x: 40, y: 40, z: -1 },
    };
    this.say({ neighbours: [...this.said().neighbours, box] });
  }

  protected removeBox(id: string): void {
    this.say({ neighbours: this.said().neighbours.filter((one) => one.id !== id) });
  }

  protected renameBox(box: Box, typed: string): void {
    const name = typed.trim().slice(0, 60);
    if (name !== '') this.replace({ ...box, name });
  }

  protected setCorner(box: Box, end: 'min' | 'max', axis: 'x' | 'y' | 'z', typed: string): void {
    const valueMm = Number(typed);
    const changed = { ...box, [end]: { ...box[end], [axis]: valueMm } };
    if (Number.isFinite(valueMm) && changed.max[axis] > changed.min[axis]) this.replace(changed);
  }

  private replace(box: Box): void {
    this.say({ neighbours: this.said().neighbours.map((one) => (one.id === box.id ? box : one)) });
  }

  private say(change: Partial<Assembly>): void {
    this.changed.emit({ ...this.said(), ...change });
  }
}
