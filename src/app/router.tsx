import { createBrowserRouter, Navigate } from 'react-router-dom';
import { BrokenPage, NotFound } from './not-found';
import { Shell, Starting } from './shell';
import { SignInPage } from './sign-in-page';

/** Every address of the application. Screens behind the sign-in are loaded when they are first gone to. */
export const router = createBrowserRouter([
  { path: '/sign-in', element: <SignInPage />, errorElement: <BrokenPage /> },
  {
    path: '/',
    element: <Shell />,
    errorElement: <BrokenPage />,
    hydrateFallbackElement: <Starting />,
    children: [
      { index: true, element: <Navigate replace to="/projects" /> },
      {
        path: 'projects',
        lazy: async () => ({
          Component: (await import('@/features/projects/components/projects-page')).ProjectsPage,
        }),
      },
      {
        path: 'projects/:projectId',
        lazy: async () => ({
          Component: (await import('@/features/projects/components/project-page')).ProjectPage,
        }),
      },
      {
        path: 'members/:memberId',
        lazy: async () => ({
          Component: (await import('@/features/member/components/member-page')).MemberPage,
        }),
        children: [
          { index: true, element: <Navigate replace to="schedule" /> },
          {
            path: 'fastening',
            lazy: async () => ({
              Component: (await import('@/features/member/components/fastening-step')).FasteningStep,
            }),
          },
          {
            path: 'schedule',
            lazy: async () => ({
              Component: (await import('@/features/member/components/schedule-step')).ScheduleStep,
            }),
          },
        ],
      },
      { path: '*', element: <NotFound /> },
    ],
  },
]);
