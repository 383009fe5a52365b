import { setTitle } from '../../analysis/index.ts';
import { Field } from '../fields/field.tsx';
import { change, sheet } from '../state/store.ts';

/** The title at the head of the sheet, to be typed over. */
export function SheetTitle() {
  return (
    <h1 class="sheet-title">
      <span class="unseen">Sheet: </span>
      <Field
        label="Title of the sheet"
        value={sheet.value.title ?? ''}
        placeholder="Untitled sheet"
        commit={(text) => {
          change('set the title', (before) => setTitle(before, text.trim()));
          return null;
        }}
      />
    </h1>
  );
}
