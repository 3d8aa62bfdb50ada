import { Injectable } from '@angular/core';

/** The token that proves to the server that a change comes from this page. Renewed with every answer about the session. */
@Injectable({ providedIn: 'root' })
export class SessionToken {
  private token: string | null = null;

  read(): string | null {
    return this.token;
  }

  renew(token: string): void {
    this.token = token;
  }
}
