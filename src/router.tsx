import { createBrowserRouter } from 'react-router-dom';
import { Loading } from './components/loading.js';
import { RouteError } from './components/route-error.js';
import { Root } from './pages/root.js';
import { SignedIn } from './pages/signed-in.js';

/** Each page is its own piece of code, fetched when it is first opened. A page exports `Component`. */
export const router = createBrowserRouter([
  {
    path: '/',
    Component: Root,
    ErrorBoundary: RouteError,
    HydrateFallback: Loading,
    children: [
      { index: true, lazy: () => import('./pages/start.js') },
      { path: 'try', lazy: () => import('./pages/try.js') },
      { path: 'register', lazy: () => import('./pages/register.js') },
      { path: 'verify/:code', lazy: () => import('./pages/verify.js') },
      { path: 'sign-in', lazy: () => import('./pages/sign-in.js') },
      { path: 'forgot', lazy: () => import('./pages/forgot.js') },
      { path: 'reset/:code', lazy: () => import('./pages/reset.js') },
      {
        Component: SignedIn,
        ErrorBoundary: RouteError,
        children: [
          { path: 'home', lazy: () => import('./pages/home.js') },
          { path: 'me', lazy: () => import('./pages/me.js') },
          { path: 'p/:project', lazy: () => import('./pages/project.js') },
          { path: 'p/:project/add', lazy: () => import('./pages/add-sweeps.js') },
          { path: 'p/:project/sheet/:sheet', lazy: () => import('./pages/sheet.js') },
          { path: 'p/:project/items', lazy: () => import('./pages/items.js') },
          { path: 'p/:project/item/:item', lazy: () => import('./pages/item.js') },
          { path: 'p/:project/sweep/:sweep', lazy: () => import('./pages/sweep.js') },
        ],
      },
      { path: '*', lazy: () => import('./pages/not-found.js') },
    ],
  },
]);
