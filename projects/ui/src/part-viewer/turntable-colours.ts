/** Colours of the turntable as the browser resolves them ("rgb(44, 65, 146)"). */
export interface TurntableColours {
  readonly metal: string;
  readonly scribe: string;
  readonly disc: string;
  readonly rim: string;
  readonly ticks: string;
  readonly shade: string;
}

/** Reads the tokens through probes that wear them: a canvas cannot read `light-dark()` by itself. */
export function readColours(probes: HTMLElement): TurntableColours {
  const read = (name: keyof TurntableColours): string => {
    const probe = probes.querySelector<HTMLElement>(`.${name}`);
    return probe === null ? 'rgb(128, 128, 128)' : getComputedStyle(probe).color;
  };
  return {
    metal: read('metal'),
    scribe: read('scribe'),
    disc: read('disc'),
    rim: read('rim'),
    ticks: read('ticks'),
    shade: read('shade'),
  };
}
