import { provideHttpClient, withFetch, withInterceptors } from '@angular/common/http';
import { ApplicationConfig, provideBrowserGlobalErrorListeners } from '@angular/core';
import {
  provideRouter,
  TitleStrategy,
  withComponentInputBinding,
  withInMemoryScrolling,
} from '@angular/router';
import { routes } from './app.routes';
import { originInterceptor } from './core/origin-interceptor';
import { PageTitle } from './core/page-title';
import { problemInterceptor } from './core/problem-interceptor';
import { sessionInterceptor } from './core/session-interceptor';

export const appConfig: ApplicationConfig = {
  providers: [
    provideBrowserGlobalErrorListeners(),
    provideRouter(
      routes,
      withComponentInputBinding(),
      withInMemoryScrolling({ scrollPositionRestoration: 'enabled' }),
    ),
    // Outermost first: a problem is made readable after the session has had its one chance to be renewed.
    provideHttpClient(
      withFetch(),
      withInterceptors([problemInterceptor, originInterceptor, sessionInterceptor]),
    ),
    { provide: TitleStrategy, useExisting: PageTitle },
  ],
};
