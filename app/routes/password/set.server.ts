import { parseWithZod } from "@conform-to/zod/v4";
import { type FormReply, invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { newPasswordForm } from "#app/people/forms.ts";
import type { LinkTable } from "#app/people/links.queries.server.ts";
import { setPasswordByLink } from "#app/people/passwords.server.ts";
import { requestIdOf } from "#app/people/visitor.server.ts";

/** Sets the password that a form under a secret link chose. @returns the form's answer when it is refused, else null */
export async function setPassword(
  table: LinkTable,
  token: string,
  form: FormData,
  request: Request,
): Promise<FormReply | null> {
  const submission = parseWithZod(form, { schema: newPasswordForm });
  if (submission.status !== "success") return invalidReply(submission, { hide: ["password"] });
  try {
    await setPasswordByLink(table, token, submission.value.password, { requestId: requestIdOf(request) });
    return null;
  } catch (error) {
    return refusedReply(submission, error, { hide: ["password"] });
  }
}
