import { TodayPage } from '#src/features/today/components/today-page.tsx';

export const Component = TodayPage;
