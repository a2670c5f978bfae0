'use client'
import type { ReactNode } from 'react'
import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from 'react-aria-components'

type DialogProps = Readonly<{ title: string; open: boolean; onClose: () => void; children: ReactNode; role?: 'dialog' | 'alertdialog' }>

/** A question that has to be answered before going on. Esc and a press outside close it; focus comes back. */
export function Dialog({ title, open, onClose, children, role = 'dialog' }: DialogProps) {
  return (
    <ModalOverlay className="veil" isOpen={open} onOpenChange={(next) => !next && onClose()} isDismissable>
      <Modal>
        <AriaDialog className="dlg" role={role}>
          <Heading slot="title" level={2}>{title}</Heading>
          {children}
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  )
}
