import { Message } from '@/components/ui/Message';

/** Common practice, from memory: an AMN's filter to earth carries a current far above that of ordinary equipment. */
export function MainsCaution() {
  return (
    <Message tone="inconclusive" lead="Protective earth first, and off last." className="my-[22px]">
      An AMN leaks current to earth: without its earth the case can be live, and it may trip a residual-current device.
      It is earthed before the mains is connected. Local codes and licensed practice decide.
    </Message>
  );
}
