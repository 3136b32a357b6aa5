import '@fontsource/work-sans/latin-400.css';
import '@fontsource/work-sans/latin-500.css';
import '@fontsource/work-sans/latin-600.css';
import './theme/tokens.css';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { App } from './app/app';
import { queryClient } from './lib/query-client';
import { meQuery } from './lib/session';

// Who is signed in is asked, and the board's own code fetched, while the rest of the page gets ready.
void queryClient.prefetchQuery(meQuery);
if (location.pathname === '/') void import('./features/board/board-page');

createRoot(document.getElementById('root')!).render(
  <StrictMode>
    <App />
  </StrictMode>,
);
