import { DropdownMenu } from '@radix-ui/themes';
import type { ChartTool } from './use-chart-pointer';

export type ExportKind = 'png' | 'svg' | 'csv';

export interface ChartToolsProps {
  title: string;
  tool: ChartTool;
  onTool: (tool: ChartTool) => void;
  isZoomed: boolean;
  onReset: () => void;
  onExport: (kind: ExportKind) => void;
  wordsId: string;
  areWordsOpen: boolean;
  onWords: () => void;
  isDisabled: boolean;
}

/** The tools are words right of the title. */
export function ChartTools(props: ChartToolsProps) {
  const { title, tool, onTool, isZoomed, onReset, onExport, wordsId, areWordsOpen, onWords, isDisabled } =
    props;
  return (
    <div className="bl-chart-tools" role="group" aria-label={`Tools of ${title}`}>
      {(['cursor', 'zoom'] as const).map((name) => (
        <button
          key={name}
          type="button"
          className="bl-word"
          aria-pressed={tool === name}
          disabled={isDisabled}
          onClick={() => onTool(name)}
        >
          {name === 'cursor' ? 'Cursor' : 'Zoom'}
        </button>
      ))}
      <button type="button" className="bl-word" disabled={isDisabled || !isZoomed} onClick={onReset}>
        Reset
      </button>
      <DropdownMenu.Root modal={false}>
        <DropdownMenu.Trigger disabled={isDisabled}>
          <button type="button" className="bl-word">
            Export
          </button>
        </DropdownMenu.Trigger>
        <DropdownMenu.Content align="end">
          <DropdownMenu.Item onSelect={() => onExport('png')}>Picture, PNG</DropdownMenu.Item>
          <DropdownMenu.Item onSelect={() => onExport('svg')}>Drawing, SVG</DropdownMenu.Item>
          <DropdownMenu.Item onSelect={() => onExport('csv')}>Every point, CSV</DropdownMenu.Item>
        </DropdownMenu.Content>
      </DropdownMenu.Root>
      <button
        type="button"
        className="bl-word"
        aria-expanded={areWordsOpen}
        aria-controls={wordsId}
        disabled={isDisabled}
        onClick={onWords}
      >
        In words
      </button>
    </div>
  );
}
