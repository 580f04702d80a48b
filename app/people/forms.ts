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
});

const person = z.string().regex(/^[0-9a-f-]{36}$/i);

/** What an administrator does with accounts. There is no field for a password: nobody sets another's. */
export const peopleForm = z.discriminatedUnion("intent", [
  inviteForm,
  z.object({ intent: z.literal("roles"), person, roles }),
  z.object({ intent: z.literal("switch-off"), person }),
  z.object({ intent: z.literal("switch-on"), person }),
  z.object({ intent: z.literal("end-sessions"), person }),
  z.object({ intent: z.literal("invite-again"), person }),
]);
