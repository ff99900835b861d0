import { idOf, instant, primary, real, text, whole, table } from '../columns';

export const wallsTables = [
  table('wall', {
    columns: [
      primary(),
      idOf('workshop_id'),
      text('name'),
      text('token_hash'),
      real('diagonal_inches', 'optional'),
      real('distance_metres', 'optional'),
      idOf('approved_by_id'),
      instant('created_at'),
      instant('last_heard_at', 'optional'),
      instant('revoked_at', 'optional'),
    ],
    uniques: { uq_wall_token: ['token_hash'] },
    indices: { ix_wall_workshop: ['workshop_id'] },
    references: { workshop_id: 'workshop', approved_by_id: 'person' },
  }),
  table('wall_code', {
    columns: [
      primary(),
      text('device_code_hash'),
      text('user_code'),
      text('device'),
      instant('created_at'),
      instant('expires_at'),
      whole('interval_s'),
      instant('last_polled_at', 'optional'),
      idOf('workshop_id', 'optional'),
      idOf('wall_id', 'optional'),
      instant('collected_at', 'optional'),
    ],
    uniques: { uq_wall_code_device: ['device_code_hash'] },
    indices: { ix_wall_code_user: ['user_code'] },
    references: { workshop_id: 'workshop', wall_id: 'wall' },
  }),
];
