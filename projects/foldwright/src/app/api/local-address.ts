/** An address inside this application, or its start: what a link carries along must not lead elsewhere. */
export function localAddress(address: string | undefined): string {
  return address !== undefined && /^\/(?![/\\])/.test(address) ? address : '/';
}
