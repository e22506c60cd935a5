import type { LocalOp } from '#client/features/desk/model/document-ops.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** What every form beside the sheet is given. */
export interface DeskFormProps {
  document: FlowNetDocument;
  /** Null until the net has been read for the first time. */
  reading: NetReading | null;
  disabled: boolean;
  run: (label: string, ops: readonly LocalOp[]) => void;
  onClose: () => void;
}
