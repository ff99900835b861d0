import { optionalIdColumn, optionalJsonColumn, optionalRealColumn, wholeColumn } from './columns';

/** The columns of a pack, which a pack type and a repair both have: a repair keeps its own when its type changes. */
export const packColumns = {
  moduleTypeId: optionalIdColumn('module_type_id'),
  groupCount: wholeColumn('group_count'),
  groupsPerModule: wholeColumn('groups_per_module'),
  positionOfGroup: optionalJsonColumn('position_of_group'),
  bleedAmps: optionalRealColumn('bleed_amps'),
  aimMillivolts: optionalRealColumn('aim_millivolts'),
} as const;
