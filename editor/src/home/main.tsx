import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { Home } from './home';
import './styles/index.css';
import { linkOf } from './link';

const root = document.getElementById('root');
if (!root) throw new Error('home.html has no element with the id "root".');
createRoot(root).render(
  <StrictMode>
    <Home link={linkOf(document)} />
  </StrictMode>,
);
