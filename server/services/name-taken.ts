import { DomainError } from '../errors/domain-error';

/** 409 with its sentence at the field: what people call a thing by is unique in their workshop. */
export const nameTaken = (field: string, sentence: string): DomainError =>
  new DomainError(409, 'name_taken', sentence, { fields: { [field]: sentence } });
