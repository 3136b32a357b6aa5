import '@fontsource/work-sans/latin-400.css';
import '@fontsource/work-sans/latin-500.css';
import '@fontsource/work-sans/latin-600.css';
import './theme/tokens.css';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { App } from './app/app';
import { queryClient } from './lib/query-client';
import { boardQuery } from './live/board-query';
import { meQuery } from './lib/session';

/** Who is signed in, the board's code and its lanes are fetched while the rest of the page gets ready. */
async function fetchAhead(): Promise<void> {
  // A wall is opened by its link first: an answer from before would come after, and send it to the sign-in.
  if (location.pathname === '/wall') return;
  if (location.pathname === '/') void import('./features/board/board-page');
  await queryClient.prefetchQuery(meQuery);
  if (queryClient.getQueryData(meQuery.queryKey)) await queryClient.prefetchQuery(boardQuery);
}
void fetchAhead();

createRoot(document.getElementById('root')!).render(
  <StrictMode>
    <App />
  </StrictMode>,
);
