import { useState } from 'react';
import { pasteProblem, spreadVolts, type GroupForm } from './group-form';

/** A pasted list that was not taken. */
export interface RefusedPaste {
  /** Where it was pasted, counted from 0. */
  group: number;
  sentence: string;
  volts: readonly string[];
}

/** Puts a pasted list into the groups, or keeps it in sight with the sentence why it does not fit. */
export function useGroupPaste(form: GroupForm, count: number) {
  const [refused, setRefused] = useState<RefusedPaste | null>(null);
  return {
    refused,
    /** @returns whether it was taken */
    put: (from: number, volts: readonly string[]): boolean => {
      const sentence = pasteProblem(volts.length, from, count);
      if (sentence === null) spreadVolts(form, from, volts);
      setRefused(sentence === null ? null : { group: from, sentence, volts });
      return sentence === null;
    },
    /** Something else was typed or gone to. */
    forget: (): void => setRefused(null),
  };
}
