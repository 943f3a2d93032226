import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { Providers } from './app/providers';
import { createRouter } from './app/router';
import './styles/index.css';

const host = document.getElementById('root');
if (!host) throw new Error('index.html has no element with the id "root"');

createRoot(host).render(
  <StrictMode>
    <Providers>
      <RouterProvider router={createRouter()} />
    </Providers>
  </StrictMode>,
);
