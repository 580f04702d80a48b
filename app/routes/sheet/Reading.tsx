import { useEffect } from "react";
import { Form, Link, useFetcher, useRevalidator } from "react-router";
import type { SheetPage } from "#app/intake/sheetPage.server.ts";
import { paths } from "#app/paths.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { count } from "#app/ui/figure.ts";
import { Progress } from "#app/ui/Progress.tsx";
import { Section } from "#app/ui/Section.tsx";
import type { loader } from "../resources.sheet.progress.ts";

/** How often the page asks how far the reading is, in milliseconds. */
const INTERVAL = 1_000;

/** The progress of the reading. Without scripts the page is simply opened again. */
export function Reading({ page: { sheet, mayWork } }: { page: SheetPage }) {
  const progress = useFetcher<typeof loader>();
  const { revalidate } = useRevalidator();
  const { load, data } = progress;
  const { id } = sheet;
  useEffect(() => {
    const timer = setInterval(() => void load(paths.resource(`sheets/${id}/progress`)), INTERVAL);
    return () => clearInterval(timer);
  }, [load, id]);
  const left = data && data.state !== "reading";
  useEffect(() => {
    if (left) void revalidate();
  }, [left, revalidate]);

  const done = data?.done ?? sheet.rowsDone;
  const total = data?.total ?? sheet.rowsTotal;
  return (
    <Section head="Rows">
      <Progress done={done} of={total} label="Rows read">
        {count(done)} of {count(total)} read
      </Progress>
      <noscript>
        <p className="fine">
          <Link to={paths.sheet(id)}>Look again</Link>
        </p>
      </noscript>
      {mayWork && <Stop />}
    </Section>
  );
}

function Stop() {
  const pending = usePending("intent", "stop");
  return (
    <Form method="post" className="mt-2">
      <Button kind="text" name="intent" value="stop" pending={pending}>
        Stop reading
      </Button>
    </Form>
  );
}
