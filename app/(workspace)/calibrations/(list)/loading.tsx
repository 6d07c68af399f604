import { Busy } from '@/components/ui/busy'

export default function Loading() {
  return <Busy label="Fetching the calibrations" />
}
