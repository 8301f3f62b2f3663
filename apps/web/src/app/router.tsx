import { type ComponentType, createElement, lazy } from 'react';
import { createBrowserRouter, Link } from 'react-router-dom';

import { SignedIn } from '../lib/session';
import { Shell } from './shell';

const page = <T extends string>(load: () => Promise<Record<T, ComponentType>>, name: T) =>
  createElement(lazy(async () => ({ default: (await load())[name] })));

/** Every sheet by its address; each is loaded when it is opened. */
export const router = createBrowserRouter([
  {
    path: '/sign-in',
    element: page(() => import('../features/people/components/sign-in-page'), 'SignInPage'),
  },
  {
    path: '/first-owner',
    element: page(() => import('../features/people/components/first-owner-page'), 'FirstOwnerPage'),
  },
  {
    path: '/counter',
    element: page(() => import('../features/people/components/counter-page'), 'CounterPage'),
  },
  {
    path: '/print/memos/:number',
    element: (
      <SignedIn>
        {page(() => import('../features/memos/components/print-memo-page'), 'PrintMemoPage')}
      </SignedIn>
    ),
  },
  {
    path: '/print/returns/:number',
    element: (
      <SignedIn>
        {page(() => import('../features/returns/components/print-slip-page'), 'PrintSlipPage')}
      </SignedIn>
    ),
  },
  {
    element: (
      <SignedIn>
        <Shell />
      </SignedIn>
    ),
    children: [
      {
        path: '/',
        element: page(
          () => import('../features/first-light/components/first-light-page'),
          'FirstLightPage',
        ),
      },
      {
        path: '/password',
        element: page(() => import('../features/people/components/password-page'), 'PasswordPage'),
      },
      {
        path: '/lots',
        element: page(() => import('../features/lots/components/lots-page'), 'LotsPage'),
      },
      {
        path: '/lots/take-in',
        element: page(() => import('../features/lots/components/take-in-page'), 'TakeInPage'),
      },
      {
        path: '/lots/:number',
        element: page(() => import('../features/lots/components/lot-page'), 'LotPage'),
      },
      {
        path: '/memos',
        element: page(() => import('../features/memos/components/memos-page'), 'MemosPage'),
      },
      {
        path: '/memos/new',
        element: page(
          () => import('../features/memos/components/write-memo-page'),
          'WriteMemoPage',
        ),
      },
      {
        path: '/memos/draft/:id',
        element: page(
          () => import('../features/memos/components/write-memo-page'),
          'WriteMemoPage',
        ),
      },
      {
        path: '/memos/:number',
        element: page(() => import('../features/memos/components/memo-page'), 'MemoPage'),
      },
      {
        path: '/returns',
        element: page(() => import('../features/returns/components/returns-page'), 'ReturnsPage'),
      },
      {
        path: '/returns/:number',
        element: page(
          () => import('../features/returns/components/return-desk-page'),
          'ReturnDeskPage',
        ),
      },
      {
        path: '/customers',
        element: page(() => import('../features/parties/components/parties-page'), 'PartiesPage'),
      },
      {
        path: '/customers/:number',
        element: page(() => import('../features/parties/components/party-page'), 'PartyPage'),
      },
      {
        path: '/house',
        element: page(() => import('../features/house/components/house-page'), 'HousePage'),
      },
      {
        path: '*',
        element: (
          <div className="p-6">
            <h1>Not there</h1>
            <p className="soft">
              There is nothing at that address. <Link to="/">First light</Link>
            </p>
          </div>
        ),
      },
    ],
  },
]);
