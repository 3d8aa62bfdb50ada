import { ChangeDetectionStrategy, Component, inject, input } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { Router } from '@angular/router';
import { OnceCall } from '../api/once-call';
import { SessionApi } from '../api/session-api';
import { StorefrontApi } from '../api/storefront-api';
import { MissingShop } from './missing-shop';
import { ShopFrame } from './shop-frame';

/** Ask the workshop before buying; the answer comes by mail, with a link to the thread. */
@Component({
  selector: 'fw-ask-page',
  imports: [MatButtonModule, MatFormFieldModule, MatInputModule, MissingShop, ReactiveFormsModule, ShopFrame],
  template: `
    @if (front.value(); as shopFront) {
      <fw-shop-frame [front]="shopFront">
        <div class="page">
          <form class="paper" [formGroup]="form" (ngSubmit)="send()">
            <h1>Ask us about fit</h1>
            <p>Tell us what your machine measures where the bracket goes. The answer comes by mail.</p>
            <mat-form-field appearance="outline">
              <mat-label>Name</mat-label>
              <input matInput autocomplete="name" formControlName="name" />
              <mat-error>Type your name.</mat-error>
            </mat-form-field>
            <mat-form-field appearance="outline">
              <mat-label>E-mail</mat-label>
              <input matInput type="email" autocomplete="email" formControlName="email" />
              <mat-error>Type an e-mail address: the answer goes there.</mat-error>
            </mat-form-field>
            <mat-form-field appearance="outline">
              <mat-label>Question</mat-label>
              <textarea matInput rows="5" maxlength="3000" formControlName="text"></textarea>
              <mat-error>Write your question.</mat-error>
            </mat-form-field>
            <button matButton="filled" type="submit" [disabled]="once.isBusy()">Send the question</button>
          </form>
        </div>
      </fw-shop-frame>
    } @else {
      <fw-missing-shop [problem]="front.problem()" />
    }
  `,
  styles: `
    :host {
      display: contents;
    }

    .page {
      flex: 1;
      padding: 28px max(20px, calc(50vw - 320px)) 48px;
      background: var(--fw-bench);
    }

    .paper {
      display: grid;
      gap: 12px;
      padding: 22px 26px 24px;
      border-radius: 5px;
      background: var(--fw-paper);
      box-shadow: var(--fw-lies);
    }

    p {
      font: var(--fw-read);
      color: var(--fw-ink-soft);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AskPage {
  private readonly api = inject(StorefrontApi);
  private readonly router = inject(Router);
  private readonly user = inject(SessionApi).user;

  readonly shop = input.required<string>();
  /** Address of the listing that the question is about. */
  readonly about = input<string>();

  protected readonly front = this.api.front(this.shop);
  protected readonly once = new OnceCall();
  protected readonly form = inject(NonNullableFormBuilder).group({
    name: [this.user()?.name ?? '', [Validators.required, Validators.maxLength(80)]],
    email: [this.user()?.email ?? '', [Validators.required, Validators.email]],
    text: ['', [Validators.required, Validators.maxLength(3000)]],
  });

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid) return;
    const body = { ...this.form.getRawValue(), listingSlug: this.about() ?? null };
    const link = await this.once.run((key) => this.api.ask(this.shop(), body, key));
    if (link !== undefined) await this.router.navigate(['/shop/question', link]);
  }
}
