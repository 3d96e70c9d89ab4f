import { listOf } from '../../../domain/sked/view';
import { paths } from '../../../paths';
import type { MailContent } from '../shell';

/** To somebody who confirmed an address for which others had described stations. */
export function takenOverContent(
  publicUrl: string,
  { taken, kept }: { taken: readonly string[]; kept: readonly string[] },
): { subject: string; content: MailContent } {
  const all = listOf([...taken, ...kept]);
  return {
    subject: `${all} and the skeds so far are in your account`,
    content: {
      title: `${all} in your account`,
      paragraphs: [
        ...(taken.length > 0
          ? [
              `${listOf(taken)} is yours now, with its skeds. Nobody else finds it until you list it. Look through place, sky, equipment and hours: others entered or assumed them.`,
            ]
          : []),
        ...(kept.length > 0
          ? [
              `${listOf(kept)} is registered here by somebody else. Your skeds under that call sign go on as they are, and you answer them in your account. If the call sign is yours, write to an administrator of this service.`,
            ]
          : []),
      ],
      button: { label: 'Open your skeds', url: publicUrl + paths.skeds },
      footer: 'You get this mail because you confirmed this address at Echotide.',
    },
  };
}
