interface Choice<Key extends string> {
  readonly key: Key;
  readonly label: string;
}

interface Props<Key extends string> {
  /** What is switched, for those who do not see the words. */
  readonly label: string;
  readonly choices: readonly Choice<Key>[];
  readonly chosen: Key;
  readonly onChoose: (key: Key) => void;
}

/** Words in a row, one of them underlined by the rule of selection. */
export function WordSwitch<Key extends string>({ label, choices, chosen, onChoose }: Props<Key>) {
  return (
    <div role="group" aria-label={label} className="flex flex-wrap gap-x-2">
      {choices.map((choice) => (
        <button
          key={choice.key}
          type="button"
          aria-pressed={choice.key === chosen}
          onClick={() => {
            onChoose(choice.key);
          }}
          className="border-b-[3px] border-transparent px-2 touch hover:underline aria-pressed:border-ink aria-pressed:no-underline print:not-aria-pressed:hidden"
        >
          {choice.label}
        </button>
      ))}
    </div>
  );
}
