import type { WorkDto } from '@/shared/contract/work';
import { Span, Txt, type TxtProps } from '../primitives/txt';

/** 'Brake bleed, R-2416'; the number never breaks at its hyphen. */
export function WorkName({
  work: { title, repair },
  ...look
}: Omit<TxtProps, 'children'> & { work: Pick<WorkDto, 'title' | 'repair'> }) {
  return (
    <Txt {...look}>
      {repair ? `${title}, ` : title}
      {repair ? <Span style={unbroken}>{repair.number}</Span> : null}
    </Txt>
  );
}

const unbroken = { whiteSpace: 'nowrap' } as object;
