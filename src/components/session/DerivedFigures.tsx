import { GroupedText } from '#components/ui/GroupedText.tsx';
import { uncertainText } from '#lib/format/uncertainText.ts';
import type { SessionResultView } from '#lib/schemas/session.ts';
import { figureName, type SessionFigure } from './figureWords.ts';

/** Every figure that the session's purpose computes, with its interval and unit, and what is missing for more. */
export function DerivedFigures({ result }: { result: SessionResultView }) {
  const figures = Object.entries(result.figures);
  return (
    <section aria-labelledby="derived-heading">
      <h2 id="derived-heading">Derived values</h2>
      {figures.length > 0 && (
        <dl className="mt-2">
          {figures.map(([key, figure]) => (
            <FigureRow key={key} name={figureName(key)} figure={figure} />
          ))}
        </dl>
      )}
      {result.missing.length > 0 && (
        <div className="mt-4 border-l-[3px] border-ink pl-3">
          <p className="text-muted">Still missing</p>
          {result.missing.map((sentence) => (
            <p key={sentence}>
              <GroupedText text={sentence} />
            </p>
          ))}
        </div>
      )}
      {figures.length === 0 && result.missing.length === 0 && <p className="mt-2 text-muted">None for this purpose.</p>}
    </section>
  );
}

function FigureRow({ name, figure }: { name: string; figure: SessionFigure }) {
  const { value, low, high } = uncertainText(figure);
  return (
    <div className="flex flex-wrap items-baseline justify-between gap-x-6 border-t border-line py-2">
      <dt>{name}</dt>
      <dd className="ml-auto text-right">
        <span className="figures">
          <GroupedText text={value} />
        </span>{' '}
        {figure.unit}
        <span className="block text-small text-muted">
          between <GroupedText text={low} /> and <GroupedText text={high} />
        </span>
      </dd>
    </div>
  );
}
