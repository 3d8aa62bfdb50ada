/** Where the product answers that runs for the journeys; see product-setup.cjs. */
export function productUrl(): string {
  return given('TEST_PRODUCT_URL');
}

/** Where the local mail server lists what it took. */
export function mailListUrl(): string {
  return `http://127.0.0.1:${given('TEST_MAIL_LIST_PORT')}/messages.json`;
}

function given(name: string): string {
  const value = process.env[name];
  if (value === undefined) throw new Error(`${name} is not set: journeys run in the jest project "e2e".`);
  return value;
}
