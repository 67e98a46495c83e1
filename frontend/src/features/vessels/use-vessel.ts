import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { useOutletContext } from 'react-router-dom';

/** The vessel whose tab this is; only below the vessel layout. */
export function useVessel(): VesselDto {
  return useOutletContext<VesselDto>();
}
