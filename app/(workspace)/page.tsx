import { PageHead } from '@/components/ui/page-head'

export const metadata = { title: 'Start' }

export default function StartPage() {
  return <PageHead title="Start" />
}
