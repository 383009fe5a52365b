import type { MenuItemConstructorOptions } from 'electron';
import type { MenuCommand } from './channels.ts';

/** The native menu: every command goes to the sheet on screen, which knows what it means. */
export function menuTemplate(
  platform: NodeJS.Platform,
  send: (command: MenuCommand) => void,
  about: () => void,
): MenuItemConstructorOptions[] {
  const item = (
    label: string,
    command: MenuCommand,
    accelerator?: string,
  ): MenuItemConstructorOptions => ({
    label,
    ...(accelerator === undefined ? {} : { accelerator }),
    click: () => send(command),
  });
  const mac = platform === 'darwin';
  const aboutItem: MenuItemConstructorOptions = { label: 'About Monobis', click: about };
  return [
    ...(mac
      ? [
          {
            label: 'Monobis',
            submenu: [
              aboutItem,
              { type: 'separator' },
              { role: 'hide' },
              { role: 'unhide' },
              { type: 'separator' },
              { role: 'quit' },
            ],
          } satisfies MenuItemConstructorOptions,
        ]
      : []),
    {
      label: '&File',
      submenu: [
        item('New sheet', 'new-sheet', 'CmdOrCtrl+N'),
        item('Open sheet…', 'open-sheet', 'CmdOrCtrl+O'),
        item('Open the sample sheet', 'open-sample'),
        { type: 'separator' },
        item('Add exports…', 'add-exports', 'CmdOrCtrl+E'),
        { type: 'separator' },
        item('Save', 'save', 'CmdOrCtrl+S'),
        item('Save as…', 'save-as', 'CmdOrCtrl+Shift+S'),
        { type: 'separator' },
        item('Results as CSV…', 'export-csv'),
        item('Report as HTML…', 'export-html'),
        item('Report as PDF…', 'export-pdf', 'CmdOrCtrl+P'),
        { type: 'separator' },
        mac ? { role: 'close' } : { role: 'quit' },
      ],
    },
    {
      label: '&Edit',
      submenu: [
        item('Undo', 'undo', 'CmdOrCtrl+Z'),
        item('Redo', 'redo', mac ? 'Cmd+Shift+Z' : 'Ctrl+Y'),
        { type: 'separator' },
        { role: 'cut' },
        { role: 'copy' },
        { role: 'paste' },
        { role: 'selectAll' },
      ],
    },
    {
      label: '&View',
      submenu: [
        { role: 'resetZoom' },
        { role: 'zoomIn' },
        { role: 'zoomOut' },
        { type: 'separator' },
        { role: 'togglefullscreen' },
      ],
    },
    ...(mac ? [{ role: 'windowMenu' } satisfies MenuItemConstructorOptions] : []),
    ...(mac ? [] : [{ label: '&Help', submenu: [aboutItem] } satisfies MenuItemConstructorOptions]),
  ];
}
