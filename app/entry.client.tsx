import { startTransition, StrictMode } from "react";
import { hydrateRoot } from "react-dom/client";
import { HydratedRouter } from "react-router/dom";
import { NonceContext } from "#app/http/nonce.ts";

startTransition(() => {
  hydrateRoot(
    document,
    <StrictMode>
      {/* Browsers show a nonce to scripts as empty; so that is what hydration must find. */}
      <NonceContext value="">
        <HydratedRouter />
      </NonceContext>
    </StrictMode>,
  );
});
