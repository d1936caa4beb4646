'use client';

import dynamic from 'next/dynamic';

const PartWaits = () => (
  <p className="py-4 text-ink3" role="status">
    Opening
  </p>
);
/** Each part comes when its tab is chosen, the dialogs when they are asked for. */
export const TargetTable = dynamic(async () => (await import('./target-table')).TargetTable);
export const TargetPanel = dynamic(async () => (await import('./target-panel')).TargetPanel);
export const SurveyMaps = dynamic(
  async () => (await import('@/components/maps/survey-maps')).SurveyMaps,
  {
    loading: PartWaits,
  },
);
export const CompanionTable = dynamic(
  async () => (await import('./companion-table')).CompanionTable,
  {
    loading: PartWaits,
  },
);
export const UploadList = dynamic(async () => (await import('./upload-list')).UploadList, {
  loading: PartWaits,
});
export const SurveySharing = dynamic(
  async () => (await import('@/components/sharing/survey-sharing')).SurveySharing,
  { loading: PartWaits },
);
export const SurveyFactsDialog = dynamic(
  async () => (await import('./survey-facts-dialog')).SurveyFactsDialog,
);
export const MapSettingsDialog = dynamic(
  async () => (await import('./map-settings-dialog')).MapSettingsDialog,
);
