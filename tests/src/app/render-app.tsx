import { QueryClientProvider } from "@tanstack/react-query";
import { configure, render } from "@testing-library/react";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { vi } from "vitest";
import { makeQueryClient } from "../../../src/api/query-client.ts";
import { routes } from "../../../src/app/router.tsx";

// Pages are fetched when they are first opened, which takes its time on a busy computer.
configure({ asyncUtilTimeout: 20_000 });
vi.setConfig({ testTimeout: 60_000 });

/** The whole client at an address, as a browser would open it. */
export function renderApp(address: string) {
  const router = createMemoryRouter(routes, { initialEntries: [address] });
  const queries = makeQueryClient();
  render(
    <QueryClientProvider client={queries}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { router, queries };
}
