import { createContext, useContext } from 'react';
import type { UnitSystem } from '@shared/units';

const UnitsContext = createContext<UnitSystem>('metric');

/** Tells everything below in which units the signed-in person reads. */
export const UnitsProvider = UnitsContext.Provider;

/** The units in which the person reads; stored values never change with it. */
export function useUnits(): UnitSystem {
  return useContext(UnitsContext);
}
