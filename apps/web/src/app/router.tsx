import { createBrowserRouter } from 'react-router-dom';
import { RouteError } from './route-error';
import { NotFound } from '../components/not-found';
import { Root } from './root';

/** One file a route, each read when it is first opened; so the sign-in page needs none of what comes after it. */
export function createRouter() {
  return createBrowserRouter([
    {
      element: <Root />,
      errorElement: <RouteError />,
      hydrateFallbackElement: <></>,
      children: [
        {
          lazy: () => import('./front-door'),
          errorElement: <RouteError />,
          children: [
            { path: 'sign-in', lazy: () => import('../routes/sign-in') },
            { path: 'sign-up', lazy: () => import('../routes/sign-up') },
            { path: 'forgotten-password', lazy: () => import('../routes/forgotten-password') },
            { path: 'new-password', lazy: () => import('../routes/new-password') },
            { path: 'invitation', lazy: () => import('../routes/invitation') },
          ],
        },
        {
          lazy: () => import('./shell'),
          errorElement: <RouteError />,
          children: [
            {
              errorElement: <RouteError />,
              children: [
                { index: true, lazy: () => import('../routes/projects') },
                { path: 'projects/:projectId', lazy: () => import('../routes/project') },
                { path: 'projects/:projectId/parts/:partId', lazy: () => import('../routes/part') },
                { path: 'materials', lazy: () => import('../routes/materials') },
                { path: 'materials/:materialId', lazy: () => import('../routes/material') },
                { path: 'people', lazy: () => import('../routes/people') },
                { path: '*', element: <NotFound /> },
              ],
            },
          ],
        },
      ],
    },
  ]);
}
