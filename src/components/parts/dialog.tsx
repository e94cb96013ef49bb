import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from "react-aria-components"
import { Button } from "./button"

/** Asks before a grave act: lock, delete, hand over. For nothing else. */
export function GraveDialog({
  title,
  isOpen,
  onClose,
  children,
}: {
  title: string
  isOpen: boolean
  onClose: () => void
  children: React.ReactNode
}) {
  return (
    <ModalOverlay
      isOpen={isOpen}
      onOpenChange={(open) => !open && onClose()}
      isDismissable
      className="fixed inset-0 z-40 grid place-items-center overflow-y-auto bg-ink/30 p-4"
    >
      <Modal className="w-full max-w-lg rounded-sheet border border-rule bg-paper p-6">
        <AriaDialog className="outline-none">
          <Heading slot="title" className="mt-0 mb-4 font-serif text-head">
            {title}
          </Heading>
          {children}
          <div className="mt-4">
            <Button look="quiet" onPress={onClose}>
              Leave it as it is
            </Button>
          </div>
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  )
}
