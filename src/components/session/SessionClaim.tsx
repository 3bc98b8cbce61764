import { GroupedText } from '#components/ui/GroupedText.tsx';
import { Sentence } from '#components/ui/Sentence.tsx';
import { uncertainText } from '#lib/format/uncertainText.ts';
import type { SessionResultView } from '#lib/schemas/session.ts';
import { figureName, mainFigure } from './figureWords.ts';

/** The result of a session: its figure, the interval, the sentence. Before there is one, words stand in its place. */
export function SessionClaim({ result }: { result: SessionResultView }) {
  const main = mainFigure(result);
  if (main === null) {
    return (
      <div aria-live="polite">
        <p className="text-title">{result.points.length === 0 ? 'Nothing measured yet' : 'No result yet'}</p>
        <Sentence>
          <GroupedText text={result.sentence} />
        </Sentence>
      </div>
    );
  }
  const [key, figure] = main;
  const { value, low, high } = uncertainText(figure);
  return (
    <div aria-live="polite" className="grid gap-2">
      <p className="text-small text-muted">{figureName(key)}</p>
      <p>
        <span className="figure-mark figures text-figure leading-none">
          <GroupedText text={value} />
        </span>
        <span className="ml-3 text-title">{figure.unit}</span>
      </p>
      <p className="text-title">
        between <GroupedText text={low} /> and <GroupedText text={high} /> (95 %)
      </p>
      <Sentence size="lead">
        <GroupedText text={result.sentence} />
      </Sentence>
    </div>
  );
}
