/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    /** Names this request in answers, log lines and the audit log. */
    requestId: string;
    actor: import('#server/policies/actor.ts').Actor | null;
    /** The sign-in that the cookie belongs to; null for tokens and for nobody. */
    authSession: import('#server/auth/authSessions.ts').CurrentAuthSession | null;
    theme: 'light' | 'dark' | 'system';
    /** The answer on the wire, to wait for slow readers; absent in the development server. */
    nodeResponse?: import('node:http').ServerResponse;
    /** What went wrong, for the page that tells it. */
    problem?: import('#lib/schemas/problem.ts').ProblemBody;
  }
}
