import type { ListingInput, ShopSettingsInput } from '@foldwright/shared/contracts/shop';
import type { Member } from '../http/visitor';
import { addListing } from '../services/shop/listings';
import { writeShopSettings } from '../services/shop/settings';
import { addKit } from '../services/stock/kits';
import type { StockTarget } from '../services/stock/shelf';
import { lockShelf, moveStock, positionOf } from '../services/stock/shelf';
import type { Database } from './database';
import type { WorkshopScope } from './workshop-scope';

const SETTINGS: ShopSettingsInput = {
  slug: 'larkfield',
  isOpen: true,
  headline: 'Brackets and kits for pedal coffee carts',
  about: 'We build carts, and these are the brackets we fit to our own. Every one is the revision that was fitted.',
  currency: 'EUR',
  taxName: 'VAT',
  taxBasisPoints: 2300,
  taxNumber: 'XX 000 000 000',
  postageMinor: 690,
  packingDays: 1,
  senderAddress: 'Larkfield Cartworks\nHopper Lane 3\nWestmere',
  questionsTo: 'imogen@larkfield.example.test',
};

interface DemoHardware {
  readonly key: string;
  readonly name: string;
  readonly specification: string;
  readonly costMinor: number;
  readonly onHand: number;
}

const HARDWARE: readonly DemoHardware[] = [
  { key: 'm5', name: 'Socket screw M5 × 16', specification: 'ISO 4762, stainless', costMinor: 14, onHand: 160 },
  { key: 'washer', name: 'Washer M5', specification: 'ISO 7089, stainless', costMinor: 3, onHand: 240 },
  { key: 'm6', name: 'Socket screw M6 × 20', specification: 'ISO 4762, stainless', costMinor: 18, onHand: 90 },
  { key: 'grommet', name: 'Hose grommet 17 mm', specification: 'rubber', costMinor: 45, onHand: 40 },
];

/** Finished brackets on the shelf: of the regulator bracket none in moss, so that a kit in moss lacks one. */
const SHELF = [
  { number: 'LC-02', finishId: 'powder-moss', quantity: 4 },
  { number: 'LC-02', finishId: 'powder-cream', quantity: 2 },
  { number: 'LC-03', finishId: 'powder-cream', quantity: 3 },
  { number: 'LC-03', finishId: 'bare', quantity: 2 },
  { number: 'LC-04', finishId: 'bare', quantity: 6 },
] as const;

const COATS: ListingInput['finishes'] = [
  { finishId: 'powder-moss', surchargeMinor: 0 },
  { finishId: 'powder-cream', surchargeMinor: 0 },
  { finishId: 'powder-ember', surchargeMinor: 0 },
  { finishId: 'bare', surchargeMinor: 0 },
];

type Words = Omit<ListingInput, 'what'>;

const KIT_WORDS: Words = {
  slug: 'two-pump-water-kit',
  title: 'Two-pump water kit',
  summary: 'Carries two diaphragm pumps, their regulator and the battery strap between the rails of a pedal cart.',
  fits: 'Rails 30 mm square, 168 to 172 mm apart\n180 mm clear above them\nPump feet 80 × 36 mm on M5',
  doesNotFit: 'Round rails\nPumps with feet on M4',
  fittingSteps:
    'Close the water and let it run out; switch the battery off.\nLay the pump tray on the rails, flanges up, and fasten it with four M5 screws and washers.\nFasten the regulator bracket to the frame with three M6 screws.\nPush the grommets into the hose holes before the hoses.\nFasten the battery strap anchor with four M5 screws and washers.\nOpen the water slowly and look for drops.',
  priceMinor: 14800,
  finishes: COATS,
  leadTimeDays: 12,
};
const REGULATOR_WORDS: Words = {
  slug: 'regulator-bracket',
  title: 'Regulator bracket',
  summary: 'Holds a regulator beside the frame, with its hose straight through.',
  fits: 'Three M6 holes, 28 mm apart\nHoses up to 16 mm outside',
  doesNotFit: 'Regulators with a side port below the flange',
  fittingSteps:
    'Let the pressure out first.\nFasten the bracket with three M6 screws.\nPush the hose through and clamp it.',
  priceMinor: 3400,
  finishes: COATS,
  leadTimeDays: 9,
};
const ANCHOR_WORDS: Words = {
  slug: 'battery-strap-anchor',
  title: 'Battery strap anchor',
  summary: 'A low bridge for a 38 mm strap, for batteries that have to stay where they are.',
  fits: 'Straps up to 38 mm wide',
  doesNotFit: 'Chains and ratchets',
  fittingSteps:
    'Switch the battery off.\nFasten the anchor with two M5 screws and washers.\nPass the strap through and pull it tight.',
  priceMinor: 1900,
  finishes: [{ finishId: 'bare', surchargeMinor: 0 }],
  leadTimeDays: 9,
};

async function revisionIdOf(scope: WorkshopScope, number: string): Promise<{ revisionId: string; partId: string }> {
  const part = await scope.rows.parts.findOne({ number });
  const revision =
    part === null ? null : await scope.rows.revisions.findOne({ partId: part.id }, { order: [['position', 'DESC']] });
  if (part === null || revision === null) throw new Error(`The demo’s ${number} is not released.`);
  return { revisionId: revision.id, partId: part.id };
}

async function putOnShelf(
  scope: WorkshopScope,
  what: StockTarget,
  quantity: number,
  member: Member,
  now: Date,
): Promise<void> {
  const position = await positionOf(scope, what);
  await moveStock(scope, position, {
    key: `demo:${position.id}`,
    kind: 'received',
    onHandChange: quantity,
    reservedChange: 0,
    reason: 'Counted when the shelf was set up',
    byName: member.userName,
    at: now,
  });
}

async function addHardware(scope: WorkshopScope, member: Member, now: Date): Promise<ReadonlyMap<string, string>> {
  const ids = new Map<string, string>();
  for (const { key, name, specification, costMinor, onHand } of HARDWARE) {
    const item = await scope.rows.hardwareItems.add({ name, specification, costMinor, currency: 'EUR' });
    ids.set(key, item.id);
    await putOnShelf(scope, { kind: 'hardware', hardwareId: item.id }, onHand, member, now);
  }
  return ids;
}

/** Shelf, hardware, the water kit and the shop of the demo, in one transaction; nothing when they are there already. */
export async function seedShop(database: Database, member: Member, now: Date): Promise<void> {
  await database.inWorkshop(member.workshopId, async (scope) => {
    await lockShelf(scope);
    if ((await scope.rows.shops.count()) > 0) return;
    await writeShopSettings(scope, SETTINGS);
    const hardware = await addHardware(scope, member, now);
    const hardwareLine = (key: string, quantity: number) => {
      const hardwareId = hardware.get(key);
      if (hardwareId === undefined) throw new Error(`The demo has no hardware ${key}.`);
      return { kind: 'hardware' as const, hardwareId, quantity };
    };
    const tray = await revisionIdOf(scope, 'LC-02');
    const regulator = await revisionIdOf(scope, 'LC-03');
    const anchor = await revisionIdOf(scope, 'LC-04');
    for (const { number, finishId, quantity } of SHELF) {
      const { revisionId } = await revisionIdOf(scope, number);
      await putOnShelf(scope, { kind: 'bracket', revisionId, finishId }, quantity, member, now);
    }
    await scope.rows.partHardware.add({
      partId: regulator.partId,
      hardwareId: hardwareLine('m6', 3).hardwareId,
      quantity: 3,
    });
    const kit = await addKit(
      scope,
      member,
      {
        name: KIT_WORDS.title,
        note: 'Everything for one cart.',
        lines: [
          { kind: 'bracket', revisionId: tray.revisionId, finishId: null, quantity: 1 },
          { kind: 'bracket', revisionId: regulator.revisionId, finishId: null, quantity: 1 },
          { kind: 'bracket', revisionId: anchor.revisionId, finishId: 'bare', quantity: 1 },
          hardwareLine('m5', 8),
          hardwareLine('washer', 8),
          hardwareLine('m6', 3),
          hardwareLine('grommet', 2),
        ],
      },
      now,
    );
    const published = [
      { ...KIT_WORDS, what: { kind: 'kit', kitId: kit.id } },
      { ...REGULATOR_WORDS, what: { kind: 'bracket', revisionId: regulator.revisionId } },
      { ...ANCHOR_WORDS, what: { kind: 'bracket', revisionId: anchor.revisionId } },
    ] as const;
    for (const input of published) {
      await scope.rows.listings.change(await addListing(scope, input, now), { state: 'published' });
    }
  });
}
