import { RouterProvider } from 'react-router-dom';
import { Providers } from './providers';
import { createQueryClient } from './query-client';
import { createRouter } from './router';

const queryClient = createQueryClient();
const router = createRouter(queryClient);

export function App() {
  return (
    <Providers queryClient={queryClient}>
      <RouterProvider router={router} />
    </Providers>
  );
}
