import { Form } from "react-router";
import { agentInWords } from "#app/people/agent.ts";
import type { ListedSession } from "#app/people/sessions.queries.server.ts";
import { Button } from "#app/ui/Button.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";

interface SessionsTableProps {
  caption: string;
  /** `here` marks the session through which the page is looked at, if it may not be ended from it. */
  sessions: readonly (ListedSession & { here?: boolean })[];
}

/** Sessions that are in use, each with the button that ends it: the intent `end-session` with the session's id. */
export function SessionsTable({ caption, sessions }: SessionsTableProps) {
  return (
    <Table caption={caption} even className="max-w-4xl">
      <thead>
        <tr>
          <th scope="col">Browser</th>
          <th scope="col">Signed in</th>
          <th scope="col">Last used</th>
          <th scope="col">
            <span className="said">End</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {sessions.map(({ id, agent, begunAt, seenAt, here = false }) => (
          <tr key={id}>
            <th scope="row" className="tight">
              {here ? <b>This one</b> : agentInWords(agent)}
            </th>
            <td className="tight">
              <Time at={begunAt} withTime />
            </td>
            <td className="tight">
              <Time at={seenAt} withTime />
            </td>
            <td>
              {!here && (
                <Form method="post">
                  <input type="hidden" name="session" value={id} />
                  <Button
                    kind="text"
                    name="intent"
                    value="end-session"
                    aria-label={`End the session of ${agentInWords(agent)}`}
                  >
                    End
                  </Button>
                </Form>
              )}
            </td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
