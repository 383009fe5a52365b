import { Refusal } from '../../analysis/index.ts';
import type { Answer, DesktopApi } from '../../main/desktop/channels.ts';
import type { Platform } from './platform.ts';

/** The page inside the desktop shell: everything through the preload's typed calls. */
export function desktopPlatform(api: DesktopApi): Platform {
  return {
    kind: 'desktop',
    openSheet: async () => valueOf(await api.openSheet()),
    openExports: async () => valueOf(await api.openExports()),
    saveSheet: async (text, handle, suggestedName) =>
      valueOf(
        await api.saveSheet({
          text,
          handle: typeof handle === 'string' ? handle : null,
          suggestedName,
        }),
      ),
    exportText: async (text, suggestedName, kind) =>
      valueOf(await api.exportText({ text, suggestedName, kind })),
    exportPdf: async (html, suggestedName) => valueOf(await api.exportPdf({ html, suggestedName })),
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

function valueOf<T>(answer: Answer<T>): T {
  if (answer.ok) return answer.value;
  throw new Refusal(answer.refusal);
}
