import { createContext, useContext, type ReactNode } from 'react';
import { marksOf, pointMarks, type LocaleMarks } from './marks';

export interface Formats {
  marks: LocaleMarks;
  /** IANA zone of the workshop. */
  zone: string;
}

const FormatsContext = createContext<Formats>({ marks: pointMarks, zone: 'UTC' });

/** The marks of the device's language and the zone of the workshop, for every number and clock inside. */
export const FormatsProvider = ({
  languageTag,
  zone,
  children,
}: {
  languageTag: string;
  zone: string;
  children: ReactNode;
}) => <FormatsContext.Provider value={{ marks: marksOf(languageTag), zone }}>{children}</FormatsContext.Provider>;

export const useFormats = (): Formats => useContext(FormatsContext);
