import { Component, type ComponentChildren } from 'preact';
import type { Sheet } from '../../analysis/index.ts';
import { tellFault } from '../state/notices.ts';

interface SafePartProps {
  /** The sheet that is drawn: another one is another chance. */
  readonly sheet: Sheet;
  readonly children: ComponentChildren;
}

interface SafePartState {
  /** The sheet that could not be drawn. */
  readonly failed: Sheet | null;
}

/** A part of the page whose faults stay in it: the rest of the sheet remains in view and can be saved. */
export class SafePart extends Component<SafePartProps, SafePartState> {
  override state: SafePartState = { failed: null };

  override componentDidCatch(error: unknown): void {
    this.setState({ failed: this.props.sheet });
    tellFault(error);
  }

  override render({ sheet, children }: SafePartProps, { failed }: SafePartState) {
    if (failed !== sheet) return children;
    return (
      <p class="obstacle">
        This part cannot be shown, by a fault in the program. Undo the last change, or save the
        sheet and open it again.
      </p>
    );
  }
}
