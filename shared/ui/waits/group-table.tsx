import type { WaitDimension, WaitGroupDto } from '@/shared/contract/waits';
import { duration } from '../format/duration';
import { share } from '../format/quantities';
import { Duration } from '../primitives/num';
import { Table, type Column } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';
import { dimensionNames } from '@/shared/contract/wait-names';
import { againstPlan, chargesWord, fewWords, hoursWord, usedShare } from './wait-words';

const unless = (group: WaitGroupDto, text: () => string): string => (group.few ? '–' : text());
const usedText = (group: WaitGroupDto): string => {
  const used = usedShare(group);
  return used === null ? '–' : share(used);
};
/** In the place of the figure that leads: a number of so few would be read as one of many. */
const Few = () => (
  <Txt kind="small" tone="ink2" align="right" nowrap>
    fewer than 5
  </Txt>
);

function waitColumns(phone: boolean): Column<WaitGroupDto>[] {
  return [
    {
      key: 'median',
      title: 'Half under',
      numeric: true,
      phone: 'value',
      cell: (group) => (group.few ? <Few /> : <Duration seconds={group.medianS} precision="minute" kind="numS" />),
    },
    {
      key: 'p90',
      title: '9 of 10 under',
      numeric: true,
      phone: 'detail',
      cell: (group) => unless(group, () => (phone ? '9 of 10 under ' : '') + duration(group.p90S, 'minute')),
    },
    { key: 'used', title: 'Used', numeric: true, phone: 'none', cell: usedText },
    {
      key: 'lost',
      title: 'Lost',
      numeric: true,
      phone: 'detail',
      cell: (group) => hoursWord(group.lostHours) + (phone ? ' lost' : ''),
    },
    {
      key: 'plan',
      title: 'Against the plan',
      numeric: true,
      phone: 'none',
      share: 1.3,
      cell: (group) => unless(group, () => againstPlan(group.againstPlanS)),
    },
  ];
}

function planColumns(phone: boolean): Column<WaitGroupDto>[] {
  return [
    {
      key: 'bias',
      title: 'On average',
      numeric: true,
      phone: 'detail',
      cell: (group) => unless(group, () => againstPlan(group.biasS) + (phone ? ' on average' : '')),
    },
    {
      key: 'middle',
      title: 'Middle',
      numeric: true,
      phone: 'none',
      cell: (group) => unless(group, () => againstPlan(group.againstPlanS)),
    },
    {
      key: 'error',
      title: 'Half off by less than',
      numeric: true,
      phone: 'detail',
      share: 1.4,
      cell: (group) =>
        unless(group, () => (phone ? 'half off by less than ' : '') + duration(group.absErrorS, 'minute')),
    },
    {
      key: 'inside',
      title: 'Inside the band',
      numeric: true,
      phone: 'value',
      cell: (group) => (group.few ? <Few /> : share(group.insideBand)),
    },
  ];
}

/** Waits, or the plan against what came, by one dimension; a row opens the charges behind it. */
export function GroupTable({
  by,
  show,
  groups,
  onGroup,
}: {
  by: WaitDimension;
  show: 'wait' | 'plan';
  groups: readonly WaitGroupDto[];
  onGroup: (key: string) => void;
}) {
  const phone = useBreakpoint() === 'phone';
  const name = dimensionNames[by];
  const columns: Column<WaitGroupDto>[] = [
    { key: 'name', title: name, phone: 'name', share: 2, cell: (group) => group.name },
    {
      key: 'charges',
      title: 'Charges',
      numeric: true,
      phone: 'detail',
      cell: (group) => (phone ? chargesWord(group.charges) : String(group.charges)),
    },
    ...(show === 'wait' ? waitColumns(phone) : planColumns(phone)),
  ];
  return (
    <>
      <Table
        label={`${show === 'wait' ? 'Waits' : 'Planned against actual'} by ${name.toLowerCase()}`}
        rows={groups}
        rowKey={(group) => group.key}
        rowLabel={(group) => `Open the ${chargesWord(group.charges)} of ${group.name}`}
        onOpen={(group) => onGroup(group.key)}
        columns={columns}
      />
      {groups.some((group) => group.few) ? (
        <Txt kind="small" tone="ink2">
          {`A dash: ${fewWords}, too few for a middle value.`}
        </Txt>
      ) : null}
    </>
  );
}
