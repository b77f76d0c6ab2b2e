import { HelpPage } from '#src/features/help/components/help-page.tsx';

export const Component = HelpPage;
