import { lazy } from 'react';

/**
 * Panels and views that are not needed for the first sight. Each comes when it is first opened, or ahead of that once the page has time.
 */
const parts = {
  forecast: () => import('../forecast/ForecastPanel.tsx'),
  handover: () => import('../handover/HandoverPanel.tsx'),
  proof: () => import('../proof/ProofPanel.tsx'),
  comparison: () => import('../trials/Comparison.tsx'),
  growth: () => import('../forecast/Growth.tsx'),
  tree: () => import('../tree/TreeView.tsx'),
};

export const ForecastPanel = lazy(async () => ({ default: (await parts.forecast()).ForecastPanel }));
export const HandoverPanel = lazy(async () => ({ default: (await parts.handover()).HandoverPanel }));
export const ProofPanel = lazy(async () => ({ default: (await parts.proof()).ProofPanel }));
export const Comparison = lazy(async () => ({ default: (await parts.comparison()).Comparison }));
export const Growth = lazy(async () => ({ default: (await parts.growth()).Growth }));
export const TreeView = lazy(async () => ({ default: (await parts.tree()).TreeView }));

/** How long a matrix has been open before the rest is fetched, milliseconds. */
const settled = 600;

/** Fetches the rest ahead; what cannot be fetched now is tried again when it is opened. */
export function fetchAhead(): () => void {
  const timer = setTimeout(() => {
    for (const load of Object.values(parts)) load().catch(() => {});
  }, settled);
  return () => clearTimeout(timer);
}
