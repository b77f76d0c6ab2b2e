import { EquipmentPage } from '#src/features/equipment/components/equipment-page.tsx';

export const Component = EquipmentPage;
