import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { RouteError } from './errors.tsx';
import { Layout } from './layout.tsx';

/** Every page is a chunk of its own: a module that exports `Component`. */
export const routes: RouteObject[] = [
  {
    element: <Layout />,
    errorElement: <RouteError bare />,
    children: [
      {
        errorElement: <RouteError />,
        children: [
          { path: '/', lazy: () => import('../features/queue/tonight-page.tsx') },
          { path: '/sign-in', lazy: () => import('../features/accounts/sign-in-page.tsx') },
          { path: '*', lazy: () => import('./not-found.tsx') },
        ],
      },
    ],
  },
];

export const router = createBrowserRouter(routes);
