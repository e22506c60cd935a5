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
  const { sizes, window, change } = panes;
  const { folded } = sizes[pane];
  const { least, most } = paneRange(pane, window, sizes);
  const px = panePx(pane, window, sizes);
  return (
    <PaneSeparator
      label={text.size[pane]}
      help={text.help}
      paneId={paneId}
      side={side}
      px={px}
      least={least}
      most={most}
      folded={folded}
      valueText={folded ? text.folded : text.sizeOf(px)}
      foldLabel={(folded ? text.unfold : text.fold)[pane]}
      onDrag={(next) => change((now) => draggedPane(now, pane, next, window))}
      onResize={(next) => change((now) => resizedPane(now, pane, next, window))}
      onUsual={() => change((now) => usualPane(now, pane))}
      onFold={() => change((now) => foldedPane(now, pane, !folded))}
    />
  );
}
