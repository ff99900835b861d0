import type { StepResult } from '../types';
import { ampsWidening } from './charger-amps';
import type { DraftStep } from './draft';
import { leadOhmIn } from './leads';
import { chargerSd, sampleRun, type SampleRunInput } from './sample-run';

/** What the samples of a step on a charger need beside what the channel says of itself. */
type Course = Omit<SampleRunInput, 'model' | 'chargerSd' | 'leadOhmIn' | 'currentWidening' | 'startAmps'>;

/** What the step is, beside its course. */
type Told = Pick<
  DraftStep,
  'kind' | 'way' | 'groupIndexes' | 'direction' | 'setVolts' | 'setAmps' | 'socAfter' | 'polarisationAfter' | 'capVolts'
> & { channel: NonNullable<DraftStep['channel']> };

/**
 * The draft of a step on a charger: its nominal run as the core has it, and its samples by the quadrature, scaled so that the
 * nominal one takes as long as the core says.
 */
export function chargerDraft(
  model: SampleRunInput['model'],
  result: StepResult,
  told: Told,
  course: Course,
): DraftStep {
  const { channel } = told;
  const leads = leadOhmIn(channel);
  const run = sampleRun({
    ...course,
    model,
    ...(leads === undefined ? {} : { leadOhmIn: leads }),
    currentWidening: ampsWidening(channel, course.source.maxAmps, model.spreads.currentRelative),
    chargerSd: chargerSd(model, channel, course.count),
  });
  const quadrature = run(model.nominal).seconds;
  const scale = quadrature > 0 ? result.stopAtS / quadrature : 0;
  return {
    ...told,
    resistorId: null,
    together: false,
    seconds: result.stopAtS,
    voltageLimitAtS: result.voltageLimitAtS,
    ampHours: result.ampHours,
    wattHours: result.wattHours,
    endAmps: result.endAmps,
    settleS: result.settleS,
    trace: result.trace ?? [],
    groupsAcross: course.count,
    secondsIn: (sample) => run(sample).seconds * scale,
    ampHoursIn: (sample) => run(sample).ampHours,
  };
}
