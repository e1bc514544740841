import { createBrowserRouter, Navigate, type RouteObject } from "react-router-dom";
import { RuledLoading } from "../components/ui/RuledLoading.tsx";
import { paths, patterns } from "./paths.ts";
import { ErrorPage } from "./pages/ErrorPage.tsx";
import { Root } from "./Root.tsx";
import { SignedIn } from "./SignedIn.tsx";

const waiting = (
  <div className="p-8">
    <RuledLoading label="Loading the page" />
  </div>
);

/** Stages by their last part of the address; each page is fetched when it is first opened. */
const stageRoutes: RouteObject[] = [
  { path: "area", lazy: async () => ({ Component: (await import("./pages/AreaPage.tsx")).AreaPage }) },
  { path: "frame", lazy: async () => ({ Component: (await import("./pages/FramePage.tsx")).FramePage }) },
  { path: "plan", lazy: async () => ({ Component: (await import("./pages/PlanPage.tsx")).PlanPage }) },
  { path: "draw", lazy: async () => ({ Component: (await import("./pages/DrawPage.tsx")).DrawPage }) },
  { path: "field", lazy: async () => ({ Component: (await import("./pages/FieldPage.tsx")).FieldPage }) },
  { path: "counts", lazy: async () => ({ Component: (await import("./pages/CountsPage.tsx")).CountsPage }) },
  { path: "estimate", lazy: async () => ({ Component: (await import("./pages/EstimatePage.tsx")).EstimatePage }) },
  { path: "record", lazy: async () => ({ Component: (await import("./pages/RecordPage.tsx")).RecordPage }) },
];

export const routes: RouteObject[] = [
  {
    element: <Root />,
    errorElement: <ErrorPage />,
    hydrateFallbackElement: waiting,
    children: [
      { path: "/", element: <Navigate to={paths.home} replace /> },
      {
        path: patterns.signIn,
        lazy: async () => ({ Component: (await import("./pages/SignInPage.tsx")).SignInPage }),
      },
      {
        path: patterns.invitation,
        lazy: async () => ({ Component: (await import("./pages/InvitationPage.tsx")).InvitationPage }),
      },
      {
        path: patterns.askForReset,
        lazy: async () => ({ Component: (await import("./pages/AskForResetPage.tsx")).AskForResetPage }),
      },
      {
        path: patterns.reset,
        lazy: async () => ({ Component: (await import("./pages/ResetPage.tsx")).ResetPage }),
      },
      {
        lazy: async () => ({ Component: (await import("./PublicLayout.tsx")).PublicLayout }),
        children: [
          {
            path: patterns.replay,
            lazy: async () => ({ Component: (await import("./pages/ReplayPage.tsx")).ReplayPage }),
          },
        ],
      },
      {
        element: <SignedIn />,
        children: [
          {
            path: patterns.surveys,
            lazy: async () => ({ Component: (await import("./pages/SurveysPage.tsx")).SurveysPage }),
          },
          {
            path: patterns.newSurvey,
            lazy: async () => ({ Component: (await import("./pages/NewSurveyPage.tsx")).NewSurveyPage }),
          },
          {
            path: patterns.account,
            lazy: async () => ({ Component: (await import("./pages/AccountPage.tsx")).AccountPage }),
          },
          {
            path: patterns.installation,
            lazy: async () => ({ Component: (await import("./pages/InstallationPage.tsx")).InstallationPage }),
          },
          {
            path: patterns.survey,
            lazy: async () => ({ Component: (await import("./SurveyLayout.tsx")).SurveyLayout }),
            children: [
              {
                index: true,
                lazy: async () => ({ Component: (await import("./pages/FirstStage.tsx")).FirstStage }),
              },
              {
                path: "people",
                lazy: async () => ({ Component: (await import("./pages/PeoplePage.tsx")).PeoplePage }),
              },
              {
                path: "settings",
                lazy: async () => ({ Component: (await import("./pages/SettingsPage.tsx")).SettingsPage }),
              },
              ...stageRoutes,
            ],
          },
        ],
      },
      { path: "*", lazy: async () => ({ Component: (await import("./pages/NotFoundPage.tsx")).NotFoundPage }) },
    ],
  },
];

export function makeRouter() {
  return createBrowserRouter(routes);
}
