import { type ReactNode, useEffect } from "react";
import {
  isRouteErrorResponse,
  Links,
  Meta,
  Outlet,
  Scripts,
  ScrollRestoration,
  useRouteLoaderData,
} from "react-router";
import type { Route } from "./+types/root";
import { themeCookie } from "./access/index.server.ts";
import "./app.css";
import { personContext, servicesContext } from "./context.ts";
import { FaultPage } from "./routes/parts/fault-page.tsx";
import { useNonce } from "./ui/index.ts";

export async function loader({ request, context }: Route.LoaderArgs) {
  const { config } = context.get(servicesContext);
  const theme: unknown = await themeCookie(config).parse(request.headers.get("Cookie"));
  const person = context.get(personContext);
  return {
    theme: theme === "light" || theme === "dark" ? theme : null,
    person: person ? { id: person.id, name: person.name } : null,
    standIn: config.standIn,
  };
}

export function Layout({ children }: { readonly children: ReactNode }) {
  const nonce = useNonce();
  const data = useRouteLoaderData<typeof loader>("root");
  // A page may have turned itself light or dark since; what is loaded anew holds from then on.
  useEffect(() => {
    const { dataset } = document.documentElement;
    if (data?.theme) dataset.theme = data.theme;
    else delete dataset.theme;
  }, [data]);
  return (
    <html lang="en" data-theme={data?.theme ?? undefined}>
      <head>
        <meta charSet="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        {/* Vite reads the nonce of the styles it adds while developing from here. */}
        <meta property="csp-nonce" nonce={nonce} />
        <link rel="icon" href="/favicon.svg" type="image/svg+xml" />
        <Meta />
        <Links nonce={nonce} />
      </head>
      <body>
        {children}
        <ScrollRestoration nonce={nonce} />
        <Scripts nonce={nonce} />
      </body>
    </html>
  );
}

export default function Root() {
  return <Outlet />;
}

export function ErrorBoundary({ error }: Route.ErrorBoundaryProps) {
  if (!isRouteErrorResponse(error)) return <FaultPage status={500} message={null} detail={detailOf(error)} />;
  const { data, status } = error;
  const said: unknown = typeof data === "object" && data !== null && "message" in data ? data.message : null;
  return <FaultPage status={status} message={typeof said === "string" ? said : null} detail={null} />;
}

/** Only while developing: in production React Router hands over an error without its stack. */
function detailOf(error: unknown): string | null {
  return import.meta.env.DEV && error instanceof Error ? (error.stack ?? null) : null;
}
