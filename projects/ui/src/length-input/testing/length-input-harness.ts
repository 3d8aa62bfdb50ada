import { ComponentHarness, TestKey } from '@angular/cdk/testing';

/** A length field, as a person types into it. */
export class LengthInputHarness extends ComponentHarness {
  static hostSelector = 'fw-length-input';

  private readonly field = this.locatorFor('input');
  private readonly reason = this.locatorForOptional('.why');

  async text(): Promise<string> {
    return (await this.field()).getProperty<string>('value');
  }

  async type(text: string): Promise<void> {
    const field = await this.field();
    await field.clear();
    if (text !== '') await field.sendKeys(text);
  }

  async press(key: 'enter' | 'escape'): Promise<void> {
    await (await this.field()).sendKeys(key === 'enter' ? TestKey.ENTER : TestKey.ESCAPE);
  }

  async leave(): Promise<void> {
    await (await this.field()).blur();
  }

  /** Why what stands there can't be used, or null. */
  async complaint(): Promise<string | null> {
    return (await this.reason())?.text() ?? null;
  }
}
