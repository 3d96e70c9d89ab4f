/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    /** The signed-in person, or null. Set by the middleware on every request. */
    viewer: import('./server/auth/viewer').Viewer | null;
    requestId: string;
  }
}
