import {provideHttpClient, withInterceptors, withNoXsrfProtection} from '@angular/common/http';
import {
  type ApplicationConfig,
  ErrorHandler,
  inject,
  isDevMode,
  provideAppInitializer,
  provideBrowserGlobalErrorListeners,
  provideZonelessChangeDetection,
} from '@angular/core';
import {provideServiceWorker} from '@angular/service-worker';
import {provideRouter, withComponentInputBinding, withInMemoryScrolling} from '@angular/router';
import {routes} from './app.routes';
import {ErrorReporter} from './platform/error-reporter';
import {buildHeader, forgeryToken, signInAgain} from './platform/http-interceptors';
import {Session} from './session/session';

export const appConfig: ApplicationConfig = {
  providers: [
    provideZonelessChangeDetection(),
    provideBrowserGlobalErrorListeners(),
    {provide: ErrorHandler, useExisting: ErrorReporter},
    // The token is read by our own interceptor, anew at each try.
    provideHttpClient(
      withNoXsrfProtection(),
      withInterceptors([buildHeader, signInAgain, forgeryToken]),
    ),
    provideRouter(
      routes,
      withComponentInputBinding(),
      withInMemoryScrolling({scrollPositionRestoration: 'enabled'}),
    ),
    // The pages open without a connection, so that an attempt can go on; calls are never answered from it.
    provideServiceWorker('ngsw-worker.js', {
      enabled: !isDevMode(),
      registrationStrategy: 'registerWhenStable:5000',
    }),
    // Also gives the page its forgery token before the first writing call.
    provideAppInitializer(() => inject(Session).load()),
  ],
};
