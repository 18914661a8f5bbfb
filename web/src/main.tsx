import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { queryClient } from './lib/query-client.ts';
import { startWords } from './lib/words.ts';
import { router } from './router.tsx';
import './styles/main.css';

// Asked for at once, so that the lettering is there before the first words are.
for (const weight of [400, 700, 900]) void document.fonts?.load(`${weight} 15px Lato`);

const place = document.getElementById('root');
if (!place) throw new Error('index.html has no #root');

await startWords();
createRoot(place).render(
  <StrictMode>
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  </StrictMode>,
);
