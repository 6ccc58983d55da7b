/** How a family of matrices grows: plain arithmetic on finished counts. */

export { growthAt } from '../../engine/forecast/growth.ts';
export {
  type FamilyMember,
  type FigureGrowth,
  type GrowthStudy,
  studyGrowth,
} from '../../engine/forecast/growthStudy.ts';
