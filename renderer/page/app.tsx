import { productSpecies, refusalSentence } from '../../analysis/index.ts';
import {
  AliquotsSection,
  aliquotsNeeds,
  aliquotsSummary,
} from '../sections/aliquots/aliquots-section.tsx';
import { ComparedSection, comparedSummary } from '../sections/compared/compared-section.tsx';
import { FitSection, fitSummary } from '../sections/fit/fit-section.tsx';
import { reactionNeeds } from '../sections/reaction/reaction-needs.ts';
import { ReactionSection, reactionSummary } from '../sections/reaction/reaction-section.tsx';
import type { SectionProps } from '../sections/section.ts';
import { SplitSection, splitSummary } from '../sections/split/split-section.tsx';
import {
  StandardsSection,
  standardsNeeds,
  standardsSummary,
} from '../sections/standards/standards-section.tsx';
import {
  aliquot,
  change,
  chooseAliquot,
  isOpen,
  isWorking,
  obstacle,
  quantification,
  sheet,
} from '../state/store.ts';
import { run } from './actions.ts';
import { awaited } from './awaited-files.ts';
import { Dialogs } from './dialogs.tsx';
import { isDragging } from './drops.ts';
import { Empty } from './empty.tsx';
import { Header } from './header.tsx';
import { SheetSection } from './sheet-section.tsx';
import { SheetTitle } from './sheet-title.tsx';
import { Shelf } from './shelf.tsx';

/** The page: header, shelf, and the sheet from top to bottom. */
export function App() {
  return (
    <div class="page" data-dragging={isDragging.value || undefined}>
      <Header />
      <div class="page-body">
        {isOpen.value && <Shelf />}
        <main aria-busy={isWorking.value}>{isOpen.value ? <Sections /> : <Empty />}</main>
      </div>
      <Dialogs />
    </div>
  );
}

function Sections() {
  const props: SectionProps = {
    sheet: sheet.value,
    quantification: quantification.value,
    obstacle: obstacle.value === null ? null : refusalSentence(obstacle.value),
    aliquot: aliquot.value,
    change,
    chooseAliquot,
  };
  const hasAnswer = props.quantification !== null;
  const needsFit = hasAnswer ? null : fitNeeds(props);
  return (
    <>
      <SheetTitle />
      <Awaited />
      <SheetSection
        id="reaction"
        title="Reaction"
        summary={reactionSummary(props)}
        needs={reactionNeeds(props.sheet)}
      >
        <ReactionSection {...props} />
      </SheetSection>
      <SheetSection
        id="standards"
        title="Standards"
        takes="standards"
        summary={standardsSummary(props)}
        needs={standardsNeeds(props)}
      >
        <StandardsSection {...props} />
      </SheetSection>
      <SheetSection
        id="aliquots"
        title="Aliquots"
        takes="aliquots"
        summary={aliquotsSummary(props)}
        needs={aliquotsNeeds(props)}
      >
        <AliquotsSection {...props} />
      </SheetSection>
      <SheetSection id="fit" title="Fit" summary={fitSummary(props)} needs={needsFit}>
        <FitSection {...props} />
      </SheetSection>
      <SheetSection id="split" title="Split" summary={splitSummary(props)} needs={needsFit}>
        <SplitSection {...props} />
      </SheetSection>
      {(props.quantification?.results.comparisons.length ?? 0) > 0 &&
        productSpecies(props.sheet).length > 1 && (
          <SheetSection
            id="compared"
            title="Runs compared"
            summary={comparedSummary(props)}
            needs={null}
          >
            <ComparedSection {...props} />
          </SheetSection>
        )}
    </>
  );
}

/** What stands between the sheet and its first fit; null where only its own reason does. */
function fitNeeds(props: SectionProps): string | null {
  const { standards = [], aliquots = [] } = props.sheet;
  if (standards.length === 0 || aliquots.length === 0) return 'standards and a crude spectrum';
  return standardsNeeds(props);
}

/** Files that the sheet names and that are not in it. */
function Awaited() {
  const files = awaited.value;
  if (files.length === 0) return null;
  return (
    <div class="notice notice-asking" role="status">
      <div>
        <p>
          The sheet names {files.length === 1 ? 'a file that is' : `${files.length} files that are`}{' '}
          not in it. Drop {files.length === 1 ? 'it' : 'them'} on this page, or{' '}
          <button type="button" class="quiet inline" onClick={() => run('add-exports')}>
            choose {files.length === 1 ? 'it' : 'them'}
          </button>
        </p>
        <ul>
          {files.map((file) => (
            <li key={file}>{file}</li>
          ))}
        </ul>
      </div>
    </div>
  );
}
