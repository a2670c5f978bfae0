import { PersonEnd } from '@/app/_door/person-end'
import { TopBar } from '@/components/ui/top-bar'
import { env } from '@/lib/infra/env'

export default async function PapersPage() {
  return <TopBar where={[{ label: env.schoolName }]}><PersonEnd /></TopBar>
}
