import { FILE_CHOOSER_ACCEPT } from '#lib/schemas/uploadLimits.ts';
import { FileChoice } from './FileChoice.tsx';

interface Props {
  readonly onFiles: (files: File[]) => void;
  /** Files hover over the page. */
  readonly isDropOver: boolean;
}

/** The ways in: the phone's recorders where a finger points, files and dropping elsewhere. */
export function FileChoices({ onFiles, isDropOver }: Props) {
  return (
    <div className="flex flex-wrap items-center gap-3">
      <FileChoice
        label="Record sound"
        accept="audio/*"
        isRecorder
        weight="main"
        className="min-h-14 grow not-pointer-coarse:hidden"
        onFiles={onFiles}
      />
      <FileChoice
        label="Record video"
        accept="video/*"
        isRecorder
        className="min-h-14 grow not-pointer-coarse:hidden"
        onFiles={onFiles}
      />
      <FileChoice
        label="Choose files"
        accept={FILE_CHOOSER_ACCEPT}
        className="pointer-coarse:min-h-14 pointer-coarse:grow pointer-fine:border-2 pointer-fine:border-ink pointer-fine:font-bold"
        onFiles={onFiles}
      />
      <span className="hidden pointer-fine:inline">
        {isDropOver ? 'Let go to add them.' : 'or drop them anywhere on this page'}
      </span>
    </div>
  );
}
