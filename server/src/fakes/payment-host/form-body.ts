/** A body in the bracket notation of forms: `line_items[0][quantity]=1` becomes nested records. */
export interface FormRecord {
  [key: string]: string | FormRecord;
}

/** Parse a form body. Lists stay records whose keys are "0", "1", ... */
export function parseFormBody(text: string): FormRecord {
  const root: FormRecord = Object.create(null) as FormRecord;
  for (const [name, value] of new URLSearchParams(text)) {
    const keys = name.replace(/\]/g, '').split('[');
    let at = root;
    keys.forEach((key, depth) => {
      if (depth === keys.length - 1) {
        at[key] = value;
        return;
      }
      const next = at[key];
      const branch: FormRecord = typeof next === 'object' ? next : (Object.create(null) as FormRecord);
      at[key] = branch;
      at = branch;
    });
  }
  return root;
}

/** The text under a path of keys, or undefined when there is none. */
export function textAt(form: FormRecord, ...path: readonly string[]): string | undefined {
  const found = valueAt(form, path);
  return typeof found === 'string' ? found : undefined;
}

/** The record under a path of keys; an empty one when there is none. */
export function recordAt(form: FormRecord, ...path: readonly string[]): FormRecord {
  const found = valueAt(form, path);
  return typeof found === 'object' ? found : {};
}

function valueAt(form: FormRecord, path: readonly string[]): string | FormRecord | undefined {
  let at: string | FormRecord | undefined = form;
  for (const key of path) at = typeof at === 'object' ? at[key] : undefined;
  return at;
}

/** Only the texts of a record, for metadata. */
export function textsOf(form: FormRecord): Record<string, string> {
  return Object.fromEntries(
    Object.entries(form).filter((entry): entry is [string, string] => typeof entry[1] === 'string'),
  );
}
