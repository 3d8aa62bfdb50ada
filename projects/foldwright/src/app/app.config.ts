import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { type ApplicationConfig, ErrorHandler, provideBrowserGlobalErrorListeners } from '@angular/core';
import { MAT_FORM_FIELD_DEFAULT_OPTIONS } from '@angular/material/form-field';
import { TitleStrategy, provideRouter, withComponentInputBinding, withInMemoryScrolling } from '@angular/router';
import { watchForSignedOut } from './api/signed-out-watch';
import { routes } from './app.routes';
import { PageErrorHandler } from './shell/page-error-handler';
import { PageTitle } from './shell/page-title';

/** What the application is given at start. Requests go by XMLHttpRequest, because only that tells how far an upload is. */
export const appConfig: ApplicationConfig = {
  providers: [
    provideBrowserGlobalErrorListeners(),
    provideHttpClient(withInterceptors([watchForSignedOut])),
    provideRouter(routes, withComponentInputBinding(), withInMemoryScrolling({ scrollPositionRestoration: 'enabled' })),
    // Every field of a form is asked for unless its words say otherwise; a star on each says nothing.
    { provide: MAT_FORM_FIELD_DEFAULT_OPTIONS, useValue: { hideRequiredMarker: true } },
    { provide: TitleStrategy, useClass: PageTitle },
    { provide: ErrorHandler, useClass: PageErrorHandler },
  ],
};
