import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { createQueryClient } from '@/lib/query-client';
import { router } from './router';
import { applyTheme, rememberedTheme } from './theme';

/** Starts the application in `root`. */
export function start(root: Element): void {
  applyTheme(rememberedTheme());
  createRoot(root).render(
    <StrictMode>
      <QueryClientProvider client={createQueryClient()}>
        <RouterProvider router={router} />
      </QueryClientProvider>
    </StrictMode>,
  );
}
