export { drawFloorPlan, type FloorPlanData } from './floor-plan.ts';
export { drawJointPlan, type JointPlanData } from './joint-plan.ts';
export { drawTrenchPlan, type TrenchPlanData } from './trench-plan.ts';
export { drawWallElevation, type WallElevationData } from './wall-elevation.ts';
export type { SheetData } from './sheet.ts';
export * from './demo-sheets.ts';
