import type { QueryClient } from '@tanstack/react-query';
import { createBrowserRouter, type LoaderFunctionArgs, redirect } from 'react-router-dom';
import { meQuery } from '../lib/me';
import { paths, to } from './paths';
import { RouteFailure, StartingUp } from './route-failure';
import { Shell } from './shell';
import { SignedIn } from './signed-in';

/** Where somebody who is not signed in goes instead, with the way back. */
const signInFirst =
  (client: QueryClient) =>
  async ({ request }: LoaderFunctionArgs) => {
    if ((await client.ensureQueryData(meQuery)) !== null) return null;
    const url = new URL(request.url);
    return redirect(to.signIn(`${url.pathname}${url.search}`));
  };

type Screen = Promise<{ default: React.ComponentType }>;
const screen = (load: () => Screen) => async () => ({ Component: (await load()).default });

/** Each screen is its own chunk: the canvas is not loaded to sign in. */
export const createRouter = (client: QueryClient) =>
  createBrowserRouter([
    {
      errorElement: <RouteFailure />,
      hydrateFallbackElement: <StartingUp />,
      children: [
        { path: paths.signIn, lazy: screen(() => import('../routes/sign-in')) },
        { path: paths.signUp, lazy: screen(() => import('../routes/sign-up')) },
        { path: paths.forgotPassword, lazy: screen(() => import('../routes/forgot-password')) },
        { path: paths.resetPassword, lazy: screen(() => import('../routes/reset-password')) },
        { path: paths.confirmEmail, lazy: screen(() => import('../routes/confirm-email')) },
        { path: paths.invitation, lazy: screen(() => import('../routes/invitation')) },
        {
          loader: signInFirst(client),
          element: <SignedIn />,
          children: [
            { path: paths.plan, lazy: screen(() => import('../routes/plan')) },
            {
              element: <Shell />,
              children: [
                {
                  errorElement: <RouteFailure inside />,
                  children: [
                    { path: paths.home, loader: () => redirect(paths.jobs) },
                    { path: paths.jobs, lazy: screen(() => import('../routes/jobs')) },
                    { path: paths.newJob, lazy: screen(() => import('../routes/new-job')) },
                    { path: paths.job, lazy: screen(() => import('../routes/job')) },
                    { path: paths.siteWalk, lazy: screen(() => import('../routes/site-walk')) },
                    { path: paths.proposal, lazy: screen(() => import('../routes/proposal')) },
                    { path: paths.board, lazy: screen(() => import('../routes/board')) },
                    { path: paths.numbers, lazy: screen(() => import('../routes/numbers')) },
                    { path: paths.price, lazy: screen(() => import('../routes/price')) },
                    { path: paths.clients, lazy: screen(() => import('../routes/clients')) },
                    { path: paths.client, lazy: screen(() => import('../routes/client')) },
                    { path: paths.catalogue, lazy: screen(() => import('../routes/catalogue')) },
                    {
                      path: paths.newCatalogueItem,
                      lazy: screen(() => import('../routes/new-catalogue-item')),
                    },
                    { path: paths.catalogueItem, lazy: screen(() => import('../routes/catalogue-item')) },
                    { path: paths.catalogueImport, lazy: screen(() => import('../routes/catalogue-import')) },
                    { path: paths.company, lazy: screen(() => import('../routes/company')) },
                    { path: paths.priceBook, lazy: screen(() => import('../routes/price-book')) },
                    { path: paths.people, lazy: screen(() => import('../routes/people')) },
                    { path: paths.proposalTexts, lazy: screen(() => import('../routes/proposal-texts')) },
                    { path: paths.account, lazy: screen(() => import('../routes/account')) },
                    { path: '*', lazy: screen(() => import('../routes/not-found')) },
                  ],
                },
              ],
            },
          ],
        },
      ],
    },
  ]);
