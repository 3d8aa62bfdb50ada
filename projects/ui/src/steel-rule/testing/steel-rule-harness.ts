import { ComponentHarness } from '@angular/cdk/testing';

/** The rule and its verbs. */
export class SteelRuleHarness extends ComponentHarness {
  static hostSelector = 'fw-steel-rule';

  private readonly buttons = this.locatorForAll('button');

  async verbs(): Promise<readonly string[]> {
    const found = await Promise.all(
      (await this.buttons()).map(async (button) => (await button.getAttribute('aria-label')) ?? (await button.text())),
    );
    return found.map((text) => text.replace(/\s+/g, ' ').trim());
  }

  async choose(id: string): Promise<void> {
    await (await this.locatorFor(`button[data-action="${id}"]`)()).click();
  }
}
