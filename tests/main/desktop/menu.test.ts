import type { MenuItemConstructorOptions } from 'electron';
import { describe, expect, it } from 'vitest';
import { type MenuCommand, menuCommands } from '../../../main/desktop/channels.ts';
import { menuTemplate } from '../../../main/desktop/menu.ts';

const platforms = ['darwin', 'win32', 'linux'] as const;

function entries(menu: readonly MenuItemConstructorOptions[]): MenuItemConstructorOptions[] {
  return menu.flatMap(({ submenu }) => (Array.isArray(submenu) ? submenu : []));
}

describe('the menu', () => {
  it.each(platforms)('sends every command once on %s', (platform) => {
    const sent: MenuCommand[] = [];
    let abouts = 0;
    const menu = menuTemplate(
      platform,
      (command) => sent.push(command),
      () => {
        abouts += 1;
      },
    );
    // what a click hands over is not looked at
    for (const { click } of entries(menu)) click?.call(null, ...clicked);
    expect(sent.sort()).toEqual([...menuCommands].sort());
    expect(abouts).toBe(1);
  });

  it.each(platforms)('gives no key to two entries on %s', (platform) => {
    const keys = entries(
      menuTemplate(
        platform,
        () => {},
        () => {},
      ),
    )
      .map(({ accelerator }) => accelerator)
      .filter((key) => key !== undefined);
    expect(new Set(keys).size).toBe(keys.length);
    expect(keys.length).toBeGreaterThan(5);
  });
});

type Click = NonNullable<MenuItemConstructorOptions['click']>;
const clicked: Parameters<Click> = [Object.create(null), undefined, Object.create(null)];
