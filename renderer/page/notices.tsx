import { useState } from 'preact/hooks';
import { cancelReading, reading } from '../import/imports.ts';
import { dismiss, dismissAll, type Notice, notices } from '../state/notices.ts';

/** What the program has to tell, until it is dismissed. */
export function Notices() {
  const progress = reading.value;
  return (
    <section class="notices" aria-label="Notices">
      {progress && (
        <div class="notice" role="status">
          <p>
            Reading {progress.done} of {progress.of} files …{' '}
            <progress max={progress.of} value={progress.done} aria-label="Files read" />
          </p>
          <button type="button" class="quiet" onClick={cancelReading}>
            Stop
          </button>
        </div>
      )}
      {notices.value.map((notice) => (
        <NoticeCard key={notice.id} notice={notice} />
      ))}
      {notices.value.length > 2 && (
        <p class="notices-end">
          <button type="button" class="quiet" onClick={dismissAll}>
            Dismiss all {notices.value.length}
          </button>
        </p>
      )}
    </section>
  );
}

const fewLines = 3;

function NoticeCard({ notice }: { readonly notice: Notice }) {
  const { id, kind, text, details = [], copy } = notice;
  const [isWhole, setWhole] = useState(false);
  const lines = isWhole ? details : details.slice(0, fewLines);
  return (
    <div class={`notice notice-${kind}`} role={kind === 'news' ? 'status' : 'alert'}>
      <div>
        <p>{text}</p>
        {lines.length > 0 && (
          <ul>
            {lines.map((line, index) => (
              // lines may be alike, and never change their order
              <li key={index}>{line}</li>
            ))}
          </ul>
        )}
        {copy !== undefined && (
          <button
            type="button"
            class="quiet"
            onClick={() => void navigator.clipboard.writeText(copy)}
          >
            Copy for a report
          </button>
        )}
        {details.length > fewLines && (
          <button
            type="button"
            class="quiet"
            aria-expanded={isWhole}
            onClick={() => setWhole(!isWhole)}
          >
            {isWhole ? 'Show less' : `Show all ${details.length} lines`}
          </button>
        )}
      </div>
      <button type="button" class="remove" aria-label="Dismiss" onClick={() => dismiss(id)}>
        ×
      </button>
    </div>
  );
}
