import { useEffect, useRef } from "react";
import { Outlet, ScrollRestoration, useLocation } from "react-router-dom";
import { focusMain } from "../components/ui/focus-main.ts";

/** Around every page: a new page begins at its top, and the focus does not get lost with the page before. */
export function Root() {
  const { pathname } = useLocation();
  const shown = useRef(pathname);
  useEffect(() => {
    if (shown.current === pathname) return;
    shown.current = pathname;
    focusMain();
  }, [pathname]);
  return (
    <>
      <Outlet />
      <ScrollRestoration />
    </>
  );
}
