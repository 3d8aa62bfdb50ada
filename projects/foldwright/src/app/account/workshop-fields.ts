import { type FormControl, type FormGroup, type NonNullableFormBuilder, Validators } from '@angular/forms';

export type WorkshopForm = FormGroup<{ workshopName: FormControl<string>; numberPrefix: FormControl<string> }>;

/** What a workshop needs to begin: a name, and the letters that part numbers begin with. */
export function workshopForm(builder: NonNullableFormBuilder): WorkshopForm {
  return builder.group({
    workshopName: ['', [Validators.required, Validators.maxLength(80)]],
    numberPrefix: ['', [Validators.required, Validators.pattern(/^[A-Z]{1,4}$/)]],
  });
}

/** First letters of a workshop's name, as a proposal: "Larkfield Cartworks" is LC. */
export function prefixOf(workshopName: string): string {
  return workshopName
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .split(/[^A-Za-z]+/)
    .map((word) => word.charAt(0).toUpperCase())
    .join('')
    .slice(0, 4);
}
