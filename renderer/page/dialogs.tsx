import type { ComponentChildren } from 'preact';
import { useEffect, useRef } from 'preact/hooks';
import { leaveOut, pending, place } from '../import/imports.ts';
import { question } from './confirm-loss.ts';

/** The questions that the page asks. */
export function Dialogs() {
  const spectra = pending.value;
  const asked = question.value;
  return (
    <>
      {spectra && (
        <Question
          title={
            spectra.length === 1
              ? 'What is this spectrum?'
              : `What are these ${spectra.length} spectra?`
          }
          dismiss={() => leaveOut(spectra)}
        >
          <ul class="dialog-list">
            {spectra.slice(0, 8).map(({ name, source }, index) => (
              <li key={index}>
                {source?.file} · {name}
              </li>
            ))}
            {spectra.length > 8 && <li>and {spectra.length - 8} more</li>}
          </ul>
          <div class="dialog-answers">
            <button type="button" onClick={() => place(spectra, 'standards')}>
              Standards
            </button>
            <button type="button" onClick={() => place(spectra, 'aliquots')}>
              Aliquots of a crude
            </button>
            <button type="button" onClick={() => place(spectra, 'noise-scans')}>
              Scans of one cuvette, for the noise
            </button>
            <button type="button" class="quiet" onClick={() => leaveOut(spectra)}>
              Leave them out
            </button>
          </div>
        </Question>
      )}
      {asked && (
        <Question
          title="The sheet has changes that are not saved."
          dismiss={() => asked.answer(false)}
        >
          <p>They are gone if you go on.</p>
          <div class="dialog-answers">
            <button type="button" onClick={() => asked.answer(false)}>
              Stay
            </button>
            <button type="button" onClick={() => asked.answer(true)}>
              Go on without saving
            </button>
          </div>
        </Question>
      )}
    </>
  );
}

interface QuestionProps {
  readonly title: string;
  readonly dismiss: () => void;
  readonly children: ComponentChildren;
}

function Question({ title, dismiss, children }: QuestionProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const { current } = dialog;
    current?.showModal();
    // closed before it goes, so that the focus returns to where it was
    return () => current?.close();
  }, []);
  return (
    <dialog
      ref={dialog}
      aria-labelledby="dialog-title"
      onCancel={(event) => {
        event.preventDefault();
        dismiss();
      }}
    >
      <h2 id="dialog-title">{title}</h2>
      {children}
    </dialog>
  );
}
