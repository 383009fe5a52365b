import { effect } from '@preact/signals';
import { render } from 'preact';
import { openInstead, run } from './page/actions.ts';
import { App } from './page/app.tsx';
import { startTakingDrops } from './page/drops.ts';
import { startKeys } from './page/keys.ts';
import { platform } from './platform/this-platform.ts';
import './plots/plotly.css';
import { startComputing } from './state/compute.ts';
import { attempt, tellFault } from './state/notices.ts';
import { fileName, isUnsaved, sheet } from './state/store.ts';
import { quantifySheet } from './worker/analysis-client.ts';
import './page/keeping.ts';
import './style/tokens.css';
import './style/base.css';
import './style/page.css';
import './style/ledger.css';
import './style/sections.css';

const root = document.getElementById('app');
if (!root) throw new Error('the page has no place for the app');
render(<App />, root);

startComputing(quantifySheet, tellFault);
startTakingDrops();
startKeys();
platform.onCommand(run);
platform.onOpenRequested(
  (source) => void attempt(() => openInstead(source)),
  (error) => void attempt(() => Promise.reject(error)),
);
effect(() => platform.setUnsaved(isUnsaved.value));
effect(() => {
  const name = sheet.value.title || fileName.value;
  document.title = name ? `${isUnsaved.value ? '• ' : ''}${name} – Monobis` : 'Monobis';
});
window.addEventListener('unhandledrejection', (event) => tellFault(event.reason));
window.addEventListener('error', ({ error }) => {
  // what has no error to it is the browser's own chatter about layout
  if (error) tellFault(error);
});
