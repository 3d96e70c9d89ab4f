/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    /** The signed-in person, or null. Set by the middleware on every request. */
    viewer: import('./server/auth/viewer').Viewer | null;
    requestId: string;
    /** What the error page says; set by the middleware before it shows that page. */
    failure?: import('./server/http/failure').Failure;
  }
}
