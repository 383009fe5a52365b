import type { DesktopApi } from '../../main/desktop/channels.ts';
import { browserPlatform } from './browser.ts';
import { desktopPlatform } from './desktop.ts';
import type { Platform } from './platform.ts';

declare global {
  interface Window {
    readonly monobisDesktop?: DesktopApi;
  }
}

/** The desktop shell where its preload is there, else the browser. */
export const platform: Platform = window.monobisDesktop
  ? desktopPlatform(window.monobisDesktop)
  : browserPlatform();
