import { data } from "react-router";

/** Any address that no other route answers. */
export function loader(): never {
  throw data({ kind: "not-found", title: "Not found", detail: "Nothing stands at this address." }, { status: 404 });
}

export default function NotFoundPage() {
  return null;
}
