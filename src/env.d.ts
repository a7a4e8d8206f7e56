/// <reference path="../.astro/types.d.ts" />

declare namespace App {
  interface Locals {
    /** Who asks, or null; set by the middleware for every request. */
    actor: import('./lib/actor').Actor | null;
    requestId: string;
  }
}
