import type { PortDimension } from '@/shared/schema/records';

/** Dimensions of every port of a side, none of them known yet: each is inherited from the stage before. */
export const noDimensions: Omit<PortDimension, 'stageId' | 'side'> = {
  port: null,
  valveText: null,
  valveUnit: null,
  seatInnerText: null,
  seatInnerUnit: null,
  stemText: null,
  stemUnit: null,
  throatText: null,
  throatUnit: null,
  seatAngleText: null,
  seatAngleUnit: null,
  smallestSectionText: null,
  smallestSectionUnit: null,
  portVolumeText: null,
  portVolumeUnit: null,
};
