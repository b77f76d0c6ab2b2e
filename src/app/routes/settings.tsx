import { SettingsPage } from '#src/features/settings/components/settings-page.tsx';

export const Component = SettingsPage;
