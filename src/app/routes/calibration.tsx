import { CalibrationPage } from '#src/features/metrology/components/calibration-page.tsx';

export const Component = CalibrationPage;
