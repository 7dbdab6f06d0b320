import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { App } from './app.tsx';
import { watchSystemTheme } from './lib/theme.ts';
import './styles/main.css';

watchSystemTheme();

const root = document.getElementById('root');
if (!root) throw new Error('index.html has no element with id "root".');
createRoot(root).render(
  <StrictMode>
    <App />
  </StrictMode>,
);
