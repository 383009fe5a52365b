import type { Sheet } from '../sheet/schema.ts';
import { cssString } from './html.ts';
import { lookCount, speciesLook } from './species-look.ts';

const longestTitle = 70;

/** The style that depends on the sheet: the running header and foot of a page, the colours of species. */
export function pageStyle(sheet: Sheet, title: string): string {
  const signs = Array.from(title);
  const short =
    signs.length > longestTitle ? `${signs.slice(0, longestTitle - 1).join('')}…` : title;
  const mark =
    sheet.invented === true
      ? `@top-right { content: "Invented data"; width: 20%; font: 700 9px sans-serif; color: #7a4a00; }`
      : '';
  const looks = Array.from(
    { length: lookCount },
    (_, index) => `.look-${index} { color: ${speciesLook(index).colour}; }`,
  );
  return `
@page { size: auto; margin: 20mm 16mm 18mm; @top-left { content: ${cssString(short)}; width: 80%; font: 9px sans-serif; color: #4f5b60; } ${mark} @bottom-right { content: counter(page) " / " counter(pages); font: 9px sans-serif; color: #4f5b60; } }
@page :first { @top-left { content: ""; } }
${looks.join('\n')}
`;
}
