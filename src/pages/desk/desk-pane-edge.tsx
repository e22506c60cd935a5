import { PaneSeparator } from '#client/components/pane-separator.tsx';
import {
  draggedPane,
  foldedPane,
  type PaneId,
  panePx,
  paneRange,
  resizedPane,
  usualPane,
} from '#client/features/desk/model/pane-sizes.ts';
import { panesText as text } from '#client/text/panes.ts';
import type { Panes } from './use-panes.ts';

interface DeskPaneEdgeProps {
  pane: PaneId;
  side: 'left' | 'right' | 'below';
  paneId: string;
  panes: Panes;
}

/** The edge between the sheet and one of the panes about it. */
export function DeskPaneEdge({ pane, side, paneId, panes }: DeskPaneEdgeProps) {
  const { sizes, window, letterScale, change } = panes;
  const { folded } = sizes[pane];
  const { least, most } = paneRange(pane, window, sizes);
  const px = panePx(pane, window, sizes) * letterScale;
  return (
    <PaneSeparator
      label={text.size[pane]}
      help={text.help}
      paneId={paneId}
      side={side}
      px={px}
      least={least * letterScale}
      most={most * letterScale}
      folded={folded}
      valueText={folded ? text.folded : text.sizeOf(Math.round(px))}
      foldLabel={(folded ? text.unfold : text.fold)[pane]}
      onDrag={(next) => change((now) => draggedPane(now, pane, next / letterScale, window))}
      onResize={(next) => change((now) => resizedPane(now, pane, next / letterScale, window))}
      onUsual={() => change((now) => usualPane(now, pane))}
      onFold={() => change((now) => foldedPane(now, pane, !folded))}
    />
  );
}
