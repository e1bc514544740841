import { QueryClientProvider } from "@tanstack/react-query";
import { useState } from "react";
import { RouterProvider } from "react-router-dom";
import { makeQueryClient } from "../api/query-client.ts";
import { Toaster } from "../components/ui/Toaster.tsx";
import { makeRouter } from "./router.tsx";

/** The whole client: queries, routes, and where good news appears. */
export function App() {
  const [queries] = useState(makeQueryClient);
  const [router] = useState(makeRouter);
  return (
    <QueryClientProvider client={queries}>
      <RouterProvider router={router} />
      <Toaster />
    </QueryClientProvider>
  );
}
