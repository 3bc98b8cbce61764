import * as z from 'zod/mini';

export const ROLES = ['owner', 'lead', 'member', 'viewer'] as const;
export type Role = (typeof ROLES)[number];

export const PASSWORD_MINIMUM_CHARACTERS = 12;
export const PASSWORD_MAXIMUM_CHARACTERS = 128;
export const EMAIL_MAXIMUM_CHARACTERS = 254;

export const emailAddress = z.email('Must be an e-mail address.').check(z.maxLength(EMAIL_MAXIMUM_CHARACTERS));

/** Sign-in does not judge the form of what it is given: every wrong pair gets the same answer. */
export const signInRequest = z.strictObject({
  email: z.string().check(z.maxLength(EMAIL_MAXIMUM_CHARACTERS)),
  password: z.string().check(z.maxLength(PASSWORD_MAXIMUM_CHARACTERS)),
});
export type SignInRequest = z.infer<typeof signInRequest>;

export const meView = z.object({
  account: z.object({ id: z.uuid(), email: z.string(), name: z.string() }),
  benches: z.array(z.object({ id: z.uuid(), name: z.string(), role: z.enum(ROLES) })),
});
export type MeView = z.infer<typeof meView>;
