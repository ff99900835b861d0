import type { WallDto, WallMeDto, WallRequestDto } from '@/shared/contract/wall';
import type { Wall } from '../entities/wall';
import type { WallCode } from '../entities/wall-code';
import type { Workshop } from '../entities/workshop';
import { toInstant, toOptionalInstant } from './instants';

export const wallDto = (wall: Wall, approvedBy: string): WallDto => ({
  id: wall.id,
  name: wall.name,
  diagonalInches: wall.diagonalInches,
  distanceMetres: wall.distanceMetres,
  approvedBy,
  createdAt: toInstant(wall.createdAt),
  lastHeardAt: toOptionalInstant(wall.lastHeardAt),
});

export const wallMeDto = (wall: Wall, workshop: Workshop): WallMeDto => ({
  id: wall.id,
  name: wall.name,
  diagonalInches: wall.diagonalInches,
  distanceMetres: wall.distanceMetres,
  workshop: { id: workshop.id, name: workshop.name, zone: workshop.zone },
});

export const wallRequestDto = (code: WallCode): WallRequestDto => ({
  userCode: code.userCode,
  askedAt: toInstant(code.createdAt),
  expiresAt: toInstant(code.expiresAt),
  device: code.device,
});
