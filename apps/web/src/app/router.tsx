import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { RouteError } from './errors.tsx';
import { Layout } from './layout.tsx';

/** Every page is a chunk of its own: a module that exports `Component`. */
export const routes: RouteObject[] = [
  {
    element: <Layout />,
    errorElement: <RouteError bare />,
    // The first chunk arrives within the time in which a message would only flash.
    HydrateFallback: () => null,
    children: [
      {
        errorElement: <RouteError />,
        children: [
          { path: '/', lazy: () => import('../features/queue/tonight-page.tsx') },
          { path: '/sign-in', lazy: () => import('../features/accounts/sign-in-page.tsx') },
          { path: '/question', lazy: () => import('../features/models/question/picker-page.tsx') },
          { path: '/question/:model', lazy: () => import('../features/models/question/question-page.tsx') },
          { path: '/methods', lazy: () => import('../features/models/methods/methods-page.tsx') },
          { path: '/methods/:model', lazy: () => import('../features/models/methods/method-page.tsx') },
          { path: '/jobs', lazy: () => import('../features/jobs/jobs-page.tsx') },
          { path: '/jobs/:hash', lazy: () => import('../features/jobs/job-page.tsx') },
          { path: '/sweeps', lazy: () => import('../features/sweeps/sweeps-page.tsx') },
          { path: '/sweeps/:id', lazy: () => import('../features/sweeps/sweep-page.tsx') },
          { path: '/h/:hash', lazy: () => import('../features/lookup/lookup-page.tsx') },
          { path: '/account', lazy: () => import('../features/accounts/account-page.tsx') },
          { path: '/admin/people', lazy: () => import('../features/accounts/people-page.tsx') },
          { path: '/admin/workers', lazy: () => import('../features/workers/workers-page.tsx') },
          { path: '/admin/kernels', lazy: () => import('../features/kernels/kernels-page.tsx') },
          { path: '*', lazy: () => import('./not-found.tsx') },
        ],
      },
    ],
  },
];

export const router = createBrowserRouter(routes);
