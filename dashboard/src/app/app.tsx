import { FluentProvider } from '@fluentui/react-components';
import { QueryClientProvider } from '@tanstack/react-query';
import { RouterProvider } from 'react-router-dom';
import { queryClient } from '../lib/query-client';
import { themes } from '../theme/themes';
import { useLook } from '../theme/use-look';
import { router } from './router';

const transparent = { background: 'transparent', minHeight: '100vh' };

export function App() {
  const look = useLook();
  return (
    <FluentProvider theme={themes[look]} style={transparent}>
      <QueryClientProvider client={queryClient}>
        <RouterProvider router={router} />
      </QueryClientProvider>
    </FluentProvider>
  );
}
