import { PersonMenu } from '@/components/ui/person-menu'
import { maySeeOutbox } from '@/lib/tasks/may-see-outbox'
import { currentActor } from './require-actor'

/** What every top bar ends with: `<TopBar where={...}>…<PersonEnd /></TopBar>`. */
export async function PersonEnd() {
  const actor = await currentActor()
  return actor && <PersonMenu actor={actor} outbox={maySeeOutbox(actor)} />
}
