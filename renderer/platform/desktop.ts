import { Refusal } from '../../analysis/index.ts';
import type { Answer, DesktopApi } from '../../main/desktop/channels.ts';
import type { Platform } from './platform.ts';

/** The page inside the desktop shell: everything through the preload's typed calls. */
export function desktopPlatform(api: DesktopApi): Platform {
  return {
    kind: 'desktop',
    openSheet: async () => unwrapped(await api.openSheet()),
    openExports: async () => unwrapped(await api.openExports()),
    saveSheet: async (text, handle, suggestedName) =>
      unwrapped(
        await api.saveSheet({
          text,
          handle: typeof handle === 'string' ? handle : null,
          suggestedName,
        }),
      ),
    exportText: async (text, suggestedName, kind) =>
      unwrapped(await api.exportText({ text, suggestedName, kind })),
    exportPdf: async (html, suggestedName) =>
      unwrapped(await api.exportPdf({ html, suggestedName })),
    onCommand: (listener) => {
      api.onCommand(listener);
    },
    onOpenRequested: (listener, refused) => {
      api.onOpenRequested((answer) => {
        if (answer.ok) listener(answer.value);
        else refused(new Refusal(answer.refusal));
      });
    },
    setUnsaved: (unsaved) => api.setUnsaved(unsaved),
  };
}

function unwrapped<T>(answer: Answer<T>): T {
  if (answer.ok) return answer.value;
  throw new Refusal(answer.refusal);
}
