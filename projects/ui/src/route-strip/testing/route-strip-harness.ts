import { ComponentHarness } from '@angular/cdk/testing';

/** The route strip, step by step. */
export class RouteStripHarness extends ComponentHarness {
  static hostSelector = 'fw-route-strip';

  private readonly items = this.locatorForAll('li');
  private readonly stops = this.locatorForAll('.step');

  /** Label, words beside it and state of every step, as a reader hears them. */
  async steps(): Promise<readonly string[]> {
    return Promise.all((await this.stops()).map((stop) => stop.text()));
  }

  /** Index of the step that is now, or -1. */
  async current(): Promise<number> {
    const currents = await Promise.all((await this.items()).map((item) => item.getAttribute('aria-current')));
    return currents.indexOf('step');
  }

  async choose(index: number): Promise<void> {
    const stop = (await this.stops())[index];
    if (stop === undefined) throw new Error(`the strip has no step ${index}`);
    await stop.click();
  }
}
