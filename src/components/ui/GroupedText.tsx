import { Fragment } from 'react';
import { groupedParts } from './digitGroups.ts';

interface Props {
  /** Plain text; numbers in it carry no grouping. */
  readonly text: string;
}

/** A text whose long numbers are grouped by a margin, so that what is copied or read out stays plain. */
export function GroupedText({ text }: Props) {
  return groupedParts(text).map((part, index) => (
    <Fragment key={index}>{typeof part === 'string' ? part : <GroupedNumber groups={part} />}</Fragment>
  ));
}

function GroupedNumber({ groups }: { groups: readonly string[] }) {
  return (
    <span className="whitespace-nowrap">
      {groups.map((group, index) => (
        <span key={index} className={index === 0 ? undefined : 'digit-gap'}>
          {group}
        </span>
      ))}
    </span>
  );
}
