import { Message } from '@/components/ui/Message';
import type { Port } from '@/schemas/common';

/** Common practice, from memory; who works there follows the local rules. */
export function FinalsCaution({ port }: { port: Port }) {
  if (port === 'ac-mains') {
    return (
      <Message tone="inconclusive" lead="Protective earth first, and off last." className="mt-4">
        An AMN leaks current to earth: without its earth the case can be live, and it may trip a residual-current
        device. An isolating transformer before it keeps that current off the supply; it does not replace the earth.
        Switch off before changing the conductor. Local codes and licensed practice decide.
      </Message>
    );
  }
  return (
    <p className="t-detail mt-3">
      {port === 'enclosure'
        ? 'Mast and turntable move by themselves: nobody stands beside them, and the chamber door is opened only when they rest. Local rules decide.'
        : 'A network port can carry supply or ringing voltage. Local codes and licensed practice decide.'}
    </p>
  );
}
