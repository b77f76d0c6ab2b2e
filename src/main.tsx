import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { App } from '#src/app/app.tsx';

const root = document.getElementById('root');
if (root === null) {
  throw new Error('index.html has no element with the id "root"; add it.');
}
createRoot(root).render(
  <StrictMode>
    <App />
  </StrictMode>,
);
