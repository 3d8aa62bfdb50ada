/** Our materials by the codes of the cutting service's own list. Codes follow the European designations. */
const SHEET_CODES: Readonly<Record<string, string>> = {
  dc01: 'DC01',
  hrpo: 'DD11',
  galv: 'DX51D',
  ss304: '1.4301',
  ss316: '1.4401',
  al5052h32: 'AW-5052-H32',
  al6061t6: 'AW-6061-T6',
  al3003h14: 'AW-3003-H14',
  al2024t3: 'AW-2024-T3',
  cu110: 'CW-CU110',
  br260: 'CW-CUZN30',
  ti2: 'TI-GR2',
};

/** The service's code of a material; one that it has no code for goes out under our own id, for the service to refuse. */
export function sheetCodeOf(materialId: string): string {
  return SHEET_CODES[materialId] ?? materialId;
}
