import { ComponentHarness } from '@angular/cdk/testing';

/** A finding's note, as a person meets it. */
export class FindingNoteHarness extends ComponentHarness {
  static hostSelector = 'fw-finding-note';

  private readonly heading = this.locatorFor('h3');
  private readonly mendButton = this.locatorForOptional('button.mend');

  async headline(): Promise<string> {
    return (await this.heading()).text();
  }

  async text(): Promise<string> {
    return (await this.host()).text();
  }

  async mendLabel(): Promise<string | null> {
    return (await this.mendButton())?.text() ?? null;
  }

  async mend(): Promise<void> {
    const button = await this.mendButton();
    if (button === null) throw new Error('this finding offers no mend');
    await button.click();
  }
}
