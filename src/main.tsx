import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { App } from './app/App';
import './styles/main.css';

const root = document.getElementById('root');
if (root === null) throw new Error('index.html has no element #root.');

createRoot(root).render(
  <StrictMode>
    <App />
  </StrictMode>,
);
