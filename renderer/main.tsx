/** Starts the page. */
import './theme/typeface.css';
import createCache from '@emotion/cache';
import { CacheProvider } from '@emotion/react';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { App } from './frame/App.tsx';
import { Look } from './theme/Look.tsx';

const nonce = document.querySelector<HTMLMetaElement>('meta[name="csp-nonce"]')?.content ?? '';
const cache = createCache({ key: 'css', nonce, prepend: true });
const place = document.querySelector('#page');
if (place === null) throw new Error('the page has a place for the app');

createRoot(place).render(
  <StrictMode>
    <CacheProvider value={cache}>
      <Look>
        <App />
      </Look>
    </CacheProvider>
  </StrictMode>,
);
