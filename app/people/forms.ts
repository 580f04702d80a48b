import { z } from "zod";
import { LONGEST_KEY_DAYS, SCOPES } from "./key.ts";
import { ROLES } from "./person.ts";

/*
 * What the forms about people hold, one schema each, for browser and server alike. The rules on passwords and addresses
 * are the acts' own; a schema sees to it that there is something to judge.
 */

/** Longest text taken from any one field: far beyond what its rule allows, far below what would weigh. */
const LONGEST_FIELD = 2_000;

const line = (missing: string) => z.string({ error: missing }).max(LONGEST_FIELD, "This is far too long.");

const email = line("Give the e-mail address.");

export const signInForm = z.object({ email, password: line("Give the password."), to: line("").optional() });

export const forgottenForm = z.object({ email });

export const newPasswordForm = z.object({ password: line("Choose a password.") });

export const changePasswordForm = z.object({
  intent: z.literal("password"),
  current: line("Give your current password."),
  password: line("Choose the new password."),
});

export const renameForm = z.object({ intent: z.literal("rename"), name: line("Give your name.") });

export const addressForm = z.object({
  intent: z.literal("address"),
  email: line("Give the new e-mail address."),
  current: line("Give your current password."),
});

export const sessionsForm = z.discriminatedUnion("intent", [
  z.object({ intent: z.literal("end-session"), session: z.string().regex(/^[0-9a-f]{64}$/) }),
  z.object({ intent: z.literal("end-others") }),
]);

export const newKeyForm = z.object({
  intent: z.literal("make"),
  name: line("Say which program the key is for."),
  scopes: z.array(z.enum(SCOPES)).default([]),
  days: z
    .number({ error: "Give a whole number of days." })
    .int("Give a whole number of days.")
    .min(1, "A key is good for at least one day.")
    .max(LONGEST_KEY_DAYS, `A key is good for at most ${LONGEST_KEY_DAYS} days.`),
});

export const withdrawKeyForm = z.object({ intent: z.literal("withdraw"), key: z.string().regex(/^[0-9a-z]{12}$/) });

const roles = z.array(z.enum(ROLES)).default([]);

export const inviteForm = z.object({
  intent: z.literal("invite"),
  name: line("Give the person's name."),
  email,
  roles,
  password: line("").optional(),
});

const session = z.string().regex(/^[0-9a-f]{64}$/);
const key = z.string().regex(/^[0-9a-z]{12}$/);

/**
 * What an administrator does with the account whose page it is. `password` is the administrator's own, asked for once
 * more when they signed in a while ago; there is no field for another's. `confirmed` is set by the page that shows what
 * will change.
 */
const step = { password: line("").optional(), confirmed: z.literal("yes").optional() };
export const personForm = z.discriminatedUnion("intent", [
  z.object({ intent: z.literal("roles"), roles, ...step }),
  z.object({ intent: z.literal("change"), name: line("Give the person's name."), email, ...step }),
  z.object({ intent: z.literal("invite-again"), ...step }),
  z.object({ intent: z.literal("withdraw-invitation"), ...step }),
  z.object({ intent: z.literal("switch-off"), ...step }),
  z.object({ intent: z.literal("switch-on"), ...step }),
  z.object({ intent: z.literal("end-session"), session, ...step }),
  z.object({ intent: z.literal("end-sessions"), ...step }),
  z.object({ intent: z.literal("withdraw-key"), key, ...step }),
]);
export type PersonChange = z.output<typeof personForm>;
