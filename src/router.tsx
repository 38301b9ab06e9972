import type { QueryClient } from '@tanstack/react-query';
import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { paths } from './paths.ts';
import { FirstLoad } from './shell/first-load.tsx';
import { NotFoundPage } from './shell/not-found-page.tsx';
import { RouteFault } from './shell/route-fault.tsx';
import { Shell } from './shell/shell.tsx';

/** Composes the features into one application. Each place loads its code when it is entered. */
export function createRouter(queryClient: QueryClient) {
  return createBrowserRouter([
    {
      // Another person must not find what this one has seen.
      element: <Shell onSignedOut={() => queryClient.clear()} />,
      ErrorBoundary: RouteFault,
      HydrateFallback: FirstLoad,
      children: [
        {
          ErrorBoundary: RouteFault,
          children: [
            ...benchRoutes(queryClient),
            ...libraryRoutes(queryClient),
            ...boardRoutes(queryClient),
            ...reviewRoutes(queryClient),
            ...accountRoutes(),
          ],
        },
        {
          path: paths.mailbox,
          ErrorBoundary: RouteFault,
          lazy: async () => ({
            Component: (await import('./features/mailbox/mailbox-page.tsx')).MailboxPage,
          }),
        },
        {
          path: paths.api,
          lazy: async () => {
            const [{ ApiPage, apiLoader }, ErrorBoundary] = await Promise.all([
              import('./features/api-page/api-page.tsx'),
              placeFault(),
            ]);
            return { Component: ApiPage, loader: apiLoader(queryClient), ErrorBoundary };
          },
        },
        { path: '*', element: <NotFoundPage /> },
      ],
    },
  ]);
}

const placeFault = async () => (await import('./forms/place-fault.tsx')).PlaceFault;

function benchRoutes(queryClient: QueryClient): RouteObject[] {
  return [
    {
      path: paths.bench,
      ErrorBoundary: RouteFault,
      lazy: async () => ({ Component: (await import('./features/bench/bench-page.tsx')).BenchPage }),
    },
    {
      path: paths.sharedWave,
      ErrorBoundary: RouteFault,
      lazy: async () => ({
        Component: (await import('./features/bench/shared-wave-page.tsx')).SharedWavePage,
      }),
    },
    {
      path: paths.openRevision,
      lazy: async () => {
        const [{ OpenRevisionPage, openRevisionLoader }, ErrorBoundary] = await Promise.all([
          import('./features/bench/save/open-revision-page.tsx'),
          placeFault(),
        ]);
        return { Component: OpenRevisionPage, loader: openRevisionLoader(queryClient), ErrorBoundary };
      },
    },
  ];
}

function libraryRoutes(queryClient: QueryClient): RouteObject[] {
  return [
    {
      path: paths.tables,
      lazy: async () => {
        const [{ TablesPage, tablesLoader }, ErrorBoundary] = await Promise.all([
          import('./features/tables/tables-page.tsx'),
          placeFault(),
        ]);
        return { Component: TablesPage, loader: tablesLoader(queryClient), ErrorBoundary };
      },
    },
    {
      path: paths.table,
      lazy: async () => {
        const [{ TablePage, tableLoader }, { RevisionView }, { RevisionReview }, ErrorBoundary] =
          await Promise.all([
            import('./features/tables/table-page.tsx'),
            import('./features/bench/save/revision-view.tsx'),
            import('./features/reviews/revision-review.tsx'),
            placeFault(),
          ]);
        const element = <TablePage RevisionView={RevisionView} RevisionReview={RevisionReview} />;
        return { element, loader: tableLoader(queryClient), ErrorBoundary };
      },
    },
    {
      path: paths.team,
      lazy: async () => {
        const [{ TeamPage, teamLoader }, ErrorBoundary] = await Promise.all([
          import('./features/team/team-page.tsx'),
          placeFault(),
        ]);
        return { Component: TeamPage, loader: teamLoader(queryClient), ErrorBoundary };
      },
    },
    {
      path: paths.audit,
      lazy: async () => {
        const [{ AuditPage, auditLoader }, ErrorBoundary] = await Promise.all([
          import('./features/audit/audit-page.tsx'),
          placeFault(),
        ]);
        return { Component: AuditPage, loader: auditLoader(queryClient), ErrorBoundary };
      },
    },
    {
      path: paths.newTeam,
      lazy: async () => ({ Component: (await import('./features/team/new-team-page.tsx')).NewTeamPage }),
    },
    ...(['tables', 'boards', 'reviews', 'team'] as const).map((place): RouteObject => ({
      path: {
        tables: paths.anyTables,
        boards: paths.anyBoards,
        reviews: paths.anyReviews,
        team: paths.anyTeam,
      }[place],
      lazy: async () => {
        const { AnyTeamPage } = await import('./features/team/any-team-page.tsx');
        return { element: <AnyTeamPage place={place} /> };
      },
    })),
  ];
}

function boardRoutes(queryClient: QueryClient): RouteObject[] {
  return [
    {
      path: paths.boards,
      lazy: async () => {
        const [{ BoardsPage, boardsLoader }, ErrorBoundary] = await Promise.all([
          import('./features/boards/boards-page.tsx'),
          placeFault(),
        ]);
        return { Component: BoardsPage, loader: boardsLoader(queryClient), ErrorBoundary };
      },
    },
    {
      path: paths.board,
      lazy: async () => {
        const [{ BoardPage, boardLoader }, ErrorBoundary] = await Promise.all([
          import('./features/boards/board-page.tsx'),
          placeFault(),
        ]);
        return { Component: BoardPage, loader: boardLoader(queryClient), ErrorBoundary };
      },
    },
    ...(['new', 'edit'] as const).map((way): RouteObject => ({
      path: { new: paths.newBoard, edit: paths.editBoard }[way],
      lazy: async () => {
        const [{ NewBoardPage, EditBoardPage, boardFormLoader }, ErrorBoundary] = await Promise.all([
          import('./features/boards/board-form-page.tsx'),
          placeFault(),
        ]);
        return {
          Component: way === 'new' ? NewBoardPage : EditBoardPage,
          loader: boardFormLoader(queryClient),
          ErrorBoundary,
        };
      },
    })),
  ];
}

function reviewRoutes(queryClient: QueryClient): RouteObject[] {
  return [
    {
      path: paths.reviews,
      lazy: async () => {
        const [{ ReviewsPage, reviewsLoader }, ErrorBoundary] = await Promise.all([
          import('./features/reviews/reviews-page.tsx'),
          placeFault(),
        ]);
        return { Component: ReviewsPage, loader: reviewsLoader(queryClient), ErrorBoundary };
      },
    },
    {
      path: paths.review,
      lazy: async () => {
        const [{ ReviewPage, reviewLoader }, { RevisionView }, { figureGroupsOf }, ErrorBoundary] =
          await Promise.all([
            import('./features/reviews/review-page.tsx'),
            import('./features/bench/save/revision-view.tsx'),
            import('./features/bench/figures/figures.ts'),
            placeFault(),
          ]);
        const element = <ReviewPage RevisionView={RevisionView} figuresOf={figureGroupsOf} />;
        return { element, loader: reviewLoader(queryClient), ErrorBoundary };
      },
    },
    {
      path: paths.compare,
      lazy: async () => {
        const [{ ComparePage, compareLoader }, { figureGroupsOf }, ErrorBoundary] = await Promise.all([
          import('./features/reviews/compare-page.tsx'),
          import('./features/bench/figures/figures.ts'),
          placeFault(),
        ]);
        const element = <ComparePage figuresOf={figureGroupsOf} />;
        return { element, loader: compareLoader(queryClient), ErrorBoundary };
      },
    },
  ];
}

function accountRoutes(): RouteObject[] {
  return [
    {
      path: paths.account,
      lazy: async () => ({ Component: (await import('./features/account/account-page.tsx')).AccountPage }),
    },
    {
      path: paths.signUp,
      lazy: async () => ({ Component: (await import('./features/account/sign-up-page.tsx')).SignUpPage }),
    },
    {
      path: paths.signIn,
      lazy: async () => ({ Component: (await import('./features/account/sign-in-page.tsx')).SignInPage }),
    },
    {
      path: paths.forgotPassword,
      lazy: async () => ({
        Component: (await import('./features/account/forgot-password-page.tsx')).ForgotPasswordPage,
      }),
    },
    {
      path: paths.verify,
      lazy: async () => ({ Component: (await import('./features/account/verify-page.tsx')).VerifyPage }),
    },
    {
      path: paths.resetPassword,
      lazy: async () => ({
        Component: (await import('./features/account/reset-password-page.tsx')).ResetPasswordPage,
      }),
    },
    {
      path: paths.confirmAddress,
      lazy: async () => ({
        Component: (await import('./features/account/confirm-address-page.tsx')).ConfirmAddressPage,
      }),
    },
    {
      path: paths.invitation,
      lazy: async () => ({
        Component: (await import('./features/account/invitation-page.tsx')).InvitationPage,
      }),
    },
    {
      path: paths.unsubscribe,
      lazy: async () => ({
        Component: (await import('./features/account/unsubscribe-page.tsx')).UnsubscribePage,
      }),
    },
  ];
}
