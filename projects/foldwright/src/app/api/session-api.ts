import { Injectable, type Signal, computed, inject, signal } from '@angular/core';
import { acceptInvitation, createWorkshop, signUp } from '@foldwright/shared/contracts/members';
import type { Role, RouteBody } from '@foldwright/shared/contracts/route';
import {
  type Session,
  changeOwnName,
  readSession,
  signIn,
  signOut,
  switchWorkshop,
} from '@foldwright/shared/contracts/session';
import { ApiClient } from './api-client';
import { SessionToken } from './session-token';

/** Who is signed in, in which workshop and role. Read once at start, then kept by the answers of every change. */
@Injectable({ providedIn: 'root' })
export class SessionApi {
  private readonly client = inject(ApiClient);
  private readonly token = inject(SessionToken);
  private readonly known = signal<Session | null>(null);

  /** Null until it was read. */
  readonly session: Signal<Session | null> = this.known.asReadonly();
  readonly user = computed(() => this.known()?.user ?? null);
  readonly isSignedIn = computed(() => this.user() !== null);
  readonly current = computed(() => this.known()?.current ?? null);
  readonly memberships = computed(() => this.known()?.memberships ?? []);
  readonly role: Signal<Role | null> = computed(
    () => this.current()?.role ?? (this.user()?.isOperator === true ? 'operator' : null),
  );
  readonly canMake = computed(() => this.role() === 'owner' || this.role() === 'fabricator');

  /** Reads the session unless it is known already. */
  async ensure(): Promise<Session> {
    return this.known() ?? this.refresh();
  }

  async refresh(): Promise<Session> {
    return this.keep(await this.client.call(readSession, {}));
  }

  async signIn(email: string, password: string): Promise<Session> {
    await this.ensure();
    return this.keep(await this.client.call(signIn, { body: { email, password } }));
  }

  async signOut(): Promise<void> {
    await this.client.call(signOut, {});
    await this.refresh();
  }

  async switchWorkshop(workshopId: string): Promise<Session> {
    return this.keep(await this.client.call(switchWorkshop, { body: { workshopId } }));
  }

  async changeOwnName(name: string): Promise<Session> {
    return this.keep(await this.client.call(changeOwnName, { body: { name } }));
  }

  /** Makes an account and the workshop it owns. */
  async signUp(body: RouteBody<typeof signUp>): Promise<Session> {
    await this.ensure();
    return this.keep(await this.client.call(signUp, { body }));
  }

  async createWorkshop(body: RouteBody<typeof createWorkshop>, idempotencyKey: string): Promise<Session> {
    return this.keep(await this.client.call(createWorkshop, { body, idempotencyKey }));
  }

  /** Joins a workshop by its invitation; with a new account where there is none for the address. */
  async join(link: string, account: { readonly name: string; readonly password: string } | null): Promise<Session> {
    await this.ensure();
    return this.keep(await this.client.call(acceptInvitation, { params: { link }, body: { account } }));
  }

  private keep(session: Session): Session {
    this.token.renew(session.csrfToken);
    this.known.set(session);
    return session;
  }
}
