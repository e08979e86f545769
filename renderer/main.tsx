import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { createClient } from '../shared-core/contract/client.ts';
import { invariant } from '../shared-core/result/result.ts';
import { hostBridge } from './client/host-bridge.ts';
import { App } from './screens/app.tsx';

const page = document.getElementById('page');
invariant(page !== null, 'index.html has the element that the page goes into');
createRoot(page).render(
  <StrictMode>
    <App client={createClient(hostBridge())} />
  </StrictMode>,
);
