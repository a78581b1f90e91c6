import type { QueryClient } from '@tanstack/react-query';
import { createBrowserRouter, type LoaderFunctionArgs, redirect, type RouteObject } from 'react-router-dom';
import { labQuery } from '../features/labs';
import { sessionQuery } from '../features/session';
import { ApiError } from '../lib/api';
import { nextTask } from '../lib/next-task';
import { LabProvider } from './LabProvider';
import { LabShell } from './LabShell';
import { PlainShell } from './PlainShell';
import { RouteFault } from './RouteFault';
import { Starting } from './Starting';

function ownPath(request: Request): string {
  const { pathname, search } = new URL(request.url);
  return pathname + search;
}

/** Sends a stranger to sign in, and a person without a lab to make or join one. */
function entry(queryClient: QueryClient) {
  return async () => {
    const session = await queryClient.query({ ...sessionQuery, staleTime: 'static' });
    if (session.user === null) return redirect('/sign-in');
    const [first] = session.labs;
    return redirect(first === undefined ? '/welcome' : `/labs/${first.id}`);
  };
}

function signedIn(queryClient: QueryClient) {
  return async ({ request }: LoaderFunctionArgs) => {
    const session = await queryClient.query({ ...sessionQuery, staleTime: 'static' });
    if (session.user === null) return redirect(`/sign-in?returnTo=${encodeURIComponent(ownPath(request))}`);
    return null;
  };
}

/** A lab's pages: its name and convention are known before any of them is drawn. */
function inLab(queryClient: QueryClient) {
  const requireUser = signedIn(queryClient);
  return async (args: LoaderFunctionArgs) => {
    const away = await requireUser(args);
    if (away !== null) return away;
    const { labId } = args.params;
    const session = await queryClient.query({ ...sessionQuery, staleTime: 'static' });
    if (labId === undefined || !session.labs.some(({ id }) => id === labId)) {
      // The same answer as for a lab that does not exist.
      throw new ApiError(404, null, 'There is no such page, or it is not yours to see.');
    }
    await queryClient.query({ ...labQuery(labId), staleTime: 'static' });
    return null;
  };
}

type LoadPage = Extract<RouteObject['lazy'], () => unknown>;

/** A page's script, asked for in a task of its own: its many parts are asked for in one go. */
function page(load: LoadPage): LoadPage {
  return async () => {
    await nextTask();
    return load();
  };
}

const labPages: RouteObject[] = [
  { index: true, lazy: page(() => import('../features/home/HomePage')) },
  { path: 'plan', lazy: page(() => import('../features/protocols/ProtocolsPage')) },
  { path: 'plan/new', lazy: page(() => import('../features/protocols/NewProtocolPage')) },
  // Before the protocols: no protocol is called so.
  { path: 'plan/robust', lazy: page(() => import('../features/robust/RobustPage')) },
  { path: 'plan/:protocolId', lazy: page(() => import('../features/protocols/DesignerPage')) },
  {
    path: 'plan/:protocolId/versions',
    lazy: page(() => import('../features/versions/ProtocolVersionsPage')),
  },
  { path: 'plan/:protocolId/versions/:number', lazy: page(() => import('../features/versions/VersionPage')) },
  { path: 'review', lazy: page(() => import('../features/versions/VersionsPage')) },
  { path: 'bench', lazy: page(() => import('../features/benches/BenchesPage')) },
  { path: 'bench/new', lazy: page(() => import('../features/benches/NewBenchPage')) },
  { path: 'bench/:benchId/edit', lazy: page(() => import('../features/benches/EditBenchPage')) },
  { path: 'bench/start', lazy: page(() => import('../features/runs/StartRunPage')) },
  { path: 'results', lazy: page(() => import('../features/results/ResultsPage')) },
  { path: 'cabinet', lazy: page(() => import('../features/cabinet/CabinetPage')) },
  // Before the plates: no plate's id is a word.
  { path: 'cabinet/mounts', lazy: page(() => import('../features/cabinet/mounts/MountsPage')) },
  { path: 'cabinet/mounts/:mountId', lazy: page(() => import('../features/cabinet/mounts/MountPage')) },
  { path: 'cabinet/exchange', lazy: page(() => import('../features/exchange/ExchangePage')) },
  { path: 'cabinet/:plateId', lazy: page(() => import('../features/cabinet/CabinetPage')) },
  { path: 'cabinet/:plateId/scan', lazy: page(() => import('../features/scan/ScanPage')) },
  { path: 'lab', lazy: page(() => import('../features/labs/LabPage')) },
];

export function createRouter(queryClient: QueryClient) {
  return createBrowserRouter([
    {
      ErrorBoundary: RouteFault,
      HydrateFallback: Starting,
      children: [
        { path: '/', loader: entry(queryClient), Component: Starting },
        { path: '/sign-in', lazy: page(() => import('../features/session/SignInPage')) },
        {
          Component: PlainShell,
          children: [
            { path: '/quick-angles', lazy: page(() => import('../features/quick-angles/QuickAnglesPage')) },
            { path: '/conventions', lazy: page(() => import('../features/conventions/ConventionsPage')) },
            { path: '/how-numbers-are-made', lazy: page(() => import('../features/about/NumbersPage')) },
            { path: '/privacy', lazy: page(() => import('../features/about/PrivacyPage')) },
            { path: '/developer/parts', lazy: page(() => import('../features/parts/PartsPage')) },
            {
              loader: signedIn(queryClient),
              children: [
                { path: '/welcome', lazy: page(() => import('../features/welcome/WelcomePage')) },
                {
                  path: '/invitations/:token',
                  lazy: page(() => import('../features/welcome/InvitationPage')),
                },
              ],
            },
          ],
        },
        {
          path: '/labs/:labId',
          loader: inLab(queryClient),
          Component: LabProvider,
          children: [
            { Component: LabShell, children: [{ ErrorBoundary: RouteFault, children: labPages }] },
            // The bench fills the screen and brings its own navigation.
            { path: 'bench/runs/:runId', lazy: page(() => import('../features/runs/RunPage')) },
            { path: 'bench/runs/:runId/record', lazy: page(() => import('../features/runs/RunRecordPage')) },
          ],
        },
        {
          path: '*',
          loader: () => Promise.reject(new ApiError(404, null, 'There is no such page.')),
          Component: Starting,
        },
      ],
    },
  ]);
}
