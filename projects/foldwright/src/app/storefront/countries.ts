/** Where parcels go, by ISO 3166-1 alpha-2: the countries of the European Union and its neighbours in the post. */
const CODES =
  'AT BE BG CH CY CZ DE DK EE ES FI FR GB GR HR HU IE IS IT LI LT LU LV MT NL NO PL PT RO SE SI SK US'.split(' ');

const names = new Intl.DisplayNames(['en'], { type: 'region' });

export const COUNTRIES: readonly { readonly code: string; readonly name: string }[] = CODES.map((code) => ({
  code,
  name: names.of(code) ?? code,
})).sort((a, b) => a.name.localeCompare(b.name, 'en'));
