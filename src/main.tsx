/** Wires platform, workers, store and page; nothing else. */
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';

const root = document.getElementById('root');
if (root === null) throw new Error('Opening the page: its root is missing.');
createRoot(root).render(
  <StrictMode>
    <h1>Firstswing</h1>
  </StrictMode>,
);
