import { ComponentHarness, TestKey } from '@angular/cdk/testing';

/** The fold slider as a person meets it. */
export class FoldArcHarness extends ComponentHarness {
  static readonly hostSelector = 'fw-fold-arc';
  private readonly slider = this.locatorFor('[role="slider"]');

  async words(): Promise<string | null> {
    return (await this.slider()).getAttribute('aria-valuetext');
  }

  async press(key: 'up' | 'down' | 'home' | 'end'): Promise<void> {
    const keys = { up: TestKey.UP_ARROW, down: TestKey.DOWN_ARROW, home: TestKey.HOME, end: TestKey.END };
    await (await this.slider()).sendKeys(keys[key]);
  }
}
