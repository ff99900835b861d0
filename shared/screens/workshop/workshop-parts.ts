import type { ReactNode } from 'react';
import type { SectionKey } from '@/shared/ui/workshop/sections';
import { ChargersPart } from './chargers-part';
import { HoursPart } from './hours-part';
import { LimitsPart } from './limits-part';
import { MetersPart } from './meters-part';
import { ModuleTypesPart } from './module-types-part';
import { PackTypesPart } from './pack-types-part';
import type { PartProps } from './part-props';
import { PeoplePart } from './people-part';
import { PlacesPart } from './places-part';
import { ResistorsPart } from './resistors-part';
import { ServerPart } from './server-part';
import { SkillsPart } from './skills-part';
import { StaffingPart } from './staffing-part';
import { WallsPart } from './walls-part';

/** The part of each section. */
export const workshopParts: Record<SectionKey, (props: PartProps) => ReactNode> = {
  people: PeoplePart,
  staffing: StaffingPart,
  skills: SkillsPart,
  places: PlacesPart,
  chargers: ChargersPart,
  'module-types': ModuleTypesPart,
  'pack-types': PackTypesPart,
  meters: MetersPart,
  resistors: ResistorsPart,
  limits: LimitsPart,
  hours: HoursPart,
  walls: WallsPart,
  server: ServerPart,
};
