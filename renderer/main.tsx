import { effect } from '@preact/signals';
import { render } from 'preact';
import { openSource, run } from './page/actions.ts';
import { App } from './page/app.tsx';
import { startTakingDrops } from './page/drops.ts';
import { startKeys } from './page/keys.ts';
import { platform } from './platform/this-platform.ts';
import './plots/plotly.css';
import { startComputing } from './state/compute.ts';
import { startKeeping } from './state/keep.ts';
import { attempt, tellFault } from './state/notices.ts';
import { isUnsaved } from './state/store.ts';
import './style/tokens.css';
import './style/base.css';
import './style/page.css';
import './style/ledger.css';
import './style/sections.css';

const root = document.getElementById('app');
if (!root) throw new Error('the page has no place for the app');
render(<App />, root);

startComputing();
startKeeping(tellFault);
startTakingDrops();
startKeys();
platform.onCommand(run);
platform.onOpenRequested(
  (source) => void attempt(() => openSource(source)),
  (error) => void attempt(() => Promise.reject(error)),
);
effect(() => platform.setUnsaved(isUnsaved.value));
window.addEventListener('unhandledrejection', (event) => tellFault(event.reason));
