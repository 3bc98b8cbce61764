import { ClientProvider } from '#client/ClientProvider.tsx';
import { useUpdates } from '#client/hooks/useUpdates.ts';
import { CommutatorRing } from '#components/build/CommutatorRing.tsx';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { ClaimActions } from './ClaimActions.tsx';
import { ClaimFigure } from './ClaimFigure.tsx';
import { QuietLine } from './QuietLine.tsx';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
}

const NO_GEOMETRY = { poles: null, segments: null, blades: null, teeth: null, magnets: null };

/** The claim: what the recording says, how sure that is, and what a person says to it. Keeps the page up to date. */
export function Claim({ recording }: Props) {
  return (
    <ClientProvider>
      <LiveClaim initial={recording} />
    </ClientProvider>
  );
}

function LiveClaim({ initial }: { initial: RecordingView }) {
  const recording = useRecording(initial);
  const connection = useUpdates();
  return (
    <section aria-label="Claim" className="grid gap-x-6 gap-y-4 desk:grid-cols-[72px_minmax(0,1fr)_auto]">
      <div className="flex items-center gap-4 desk:contents">
        <CommutatorRing geometry={recording.build?.geometry ?? NO_GEOMETRY} size={72} />
        <div className="desk:hidden">
          <QuietLine recording={recording} />
        </div>
      </div>
      <div className="grid content-start gap-3" aria-live="polite">
        <div className="max-desk:hidden">
          <QuietLine recording={recording} />
        </div>
        <ClaimFigure recording={recording} />
        {connection === 'lost' && recording.reading === null && (
          <p className="text-muted">
            This page is not connected just now; it goes on by itself once the network is back.
          </p>
        )}
      </div>
      <ClaimActions recording={recording} />
    </section>
  );
}
