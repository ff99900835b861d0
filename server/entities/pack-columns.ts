import { optionalIdColumn, optionalJsonColumn, wholeColumn } from './columns';

/** The columns of a pack's layout, which a pack type and a repair both have: a repair keeps its own when its type changes. */
export const packColumns = {
  moduleTypeId: optionalIdColumn('module_type_id'),
  groupCount: wholeColumn('group_count'),
  groupsPerModule: wholeColumn('groups_per_module'),
  positionOfGroup: optionalJsonColumn('position_of_group'),
} as const;
