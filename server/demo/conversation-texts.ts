import type { StaffKey } from './staff.ts';

/** Working days before today (0 is today), time of day, who, and what they wrote. */
export type ConversationLine = [
  back: number,
  time: `${number}:${number}`,
  from: 'patient' | StaffKey,
  text: string,
];

export type ConversationText = {
  patient: string;
  subject: string;
  lines: readonly ConversationLine[];
  isClosed?: boolean;
  /** The other side has the last message on its screen already, unless it is unread. */
  isUnread?: boolean;
};

/** What patients have asked and what they were told, all invented. */
export const conversationTexts: readonly ConversationText[] = [
  {
    patient: 'Ines Valcourt',
    subject: 'Damp dressing',
    isClosed: true,
    lines: [
      [
        4,
        '7:14',
        'patient',
        'Good morning. The dressing was damp when I woke up, a bit pink. Should I change it?',
      ],
      [4, '7:20', 'patient', 'It is only the lower corner. I have not touched it.'],
      [
        4,
        '8:06',
        'noor',
        'Thank you for leaving it alone, Ines. Please keep it on and dry, and come in at 14:00 so that I can look at it. If you feel feverish or the redness spreads, call the on-call line straight away.',
      ],
      [4, '8:15', 'patient', 'Teo will drive me. See you at two.'],
      [
        4,
        '15:10',
        'noor',
        'All dry under the new dressing. Leave it on until I see you again, and tell me if it gets damp.',
      ],
      [4, '17:02', 'patient', 'Thank you, Noor. Dry so far.'],
    ],
  },
  {
    patient: 'Marguerite Oyelaran',
    subject: 'Ball or table?',
    lines: [
      [2, '16:20', 'patient', 'For the supported lean: do I have to buy the big ball?'],
      [
        1,
        '9:12',
        'noor',
        'No need. A table and a cloth under the hand do the same work. The trunk moves, the shoulder stays lazy.',
      ],
      [0, '6:58', 'patient', 'I don’t own a ball, is a pillowcase on the table fine?'],
    ],
    isUnread: true,
  },
  {
    patient: 'Soledad Quiroga',
    subject: 'Sleeping in the recliner',
    lines: [
      [
        1,
        '16:45',
        'patient',
        'I still sleep in the recliner and my back is tired of it. How long until I can lie flat?',
      ],
    ],
    isUnread: true,
  },
  {
    patient: 'Hal Brandvold',
    subject: 'Next visit',
    isClosed: true,
    lines: [
      [2, '11:05', 'patient', 'Is my next visit Thursday at 9:30 or 10:30? I lost the card.'],
      [2, '11:40', 'noor', 'Thursday at 10:30. Bring the sling and wear a shirt with buttons.'],
      [1, '10:02', 'patient', 'Thank you, see you Thursday.'],
    ],
  },
  {
    patient: 'Tobias Ahlgren',
    subject: 'Getting in and out of the car',
    lines: [
      [
        3,
        '18:40',
        'patient',
        'My daughter picks me up on Sundays. Which side should I get in, and who does the belt?',
      ],
      [
        2,
        '8:31',
        'noor',
        'Sit behind the driver, so that the belt comes over the good shoulder, and let her buckle it. The arm stays in the sling and does not reach across.',
      ],
    ],
  },
  {
    patient: 'Gwen Thackeray',
    subject: 'Washing under the arm',
    lines: [
      [7, '13:20', 'patient', 'I cannot get under the arm to wash. Any trick?'],
      [
        7,
        '14:05',
        'callum',
        'Lean forward with the good hand on the sink and let the arm hang. Wash and dry from the front. No lifting.',
      ],
    ],
    isUnread: true,
  },
  {
    patient: 'Yewande Castellanos',
    subject: 'Opening the next phase',
    lines: [
      [
        1,
        '12:15',
        'patient',
        'My six weeks are over. May I leave the sling off now, or do I wait for the visit?',
      ],
      [
        1,
        '13:30',
        'noor',
        'Please wait for the visit. I want to see how the arm moves before we take anything off the list.',
      ],
      [1, '13:41', 'patient', 'All right. It is on Friday, isn’t it? Can we also talk about driving?'],
    ],
    isUnread: true,
  },
  {
    patient: 'Desmond Achterberg',
    subject: 'Back to the bowls club',
    isClosed: true,
    lines: [
      [9, '9:48', 'patient', 'When may I roll a bowl again? The season opens in spring.'],
      [
        9,
        '12:10',
        'callum',
        'We will build up to it. First the band work for four weeks without pain the next day, then underarm with a tennis ball.',
      ],
      [8, '9:02', 'patient', 'Fair enough. I have the tennis ball ready.'],
    ],
  },
  {
    patient: 'Ingeborg Sørlie',
    subject: 'Ice or heat?',
    isClosed: true,
    lines: [
      [12, '20:15', 'patient', 'Is heat allowed by now? Ice makes me stiff.'],
      [
        11,
        '8:40',
        'callum',
        'Yes, warm before the exercises for ten minutes, never on the scar, and not hotter than a bath for a child.',
      ],
    ],
  },
  {
    patient: 'Lucjan Żółkiewski',
    subject: 'Shower chair',
    lines: [
      [5, '10:10', 'patient', 'Do I still need the chair in the shower? My wife wants the space back.'],
      [
        4,
        '16:20',
        'noor',
        'Keep it until the sling is off, since you have one hand to hold on with. Then we look at it together.',
      ],
    ],
  },
  {
    patient: 'Émile Grandmaison',
    subject: 'Flying in January',
    lines: [
      [
        1,
        '17:40',
        'patient',
        'I have a flight of five hours booked for January. Is there anything against it, and do I need a letter for the implant?',
      ],
    ],
    isUnread: true,
  },
  {
    patient: 'Consolata Wanjiru',
    subject: 'Medicine before the exercises',
    isClosed: true,
    lines: [
      [14, '15:30', 'patient', 'Do I take the medicine before or after the exercises?'],
      [
        14,
        '16:05',
        'noor',
        'About half an hour before, as long as your doctor’s maximum for the day allows it.',
      ],
      [13, '8:20', 'patient', 'Works much better, thank you.'],
    ],
  },
  {
    patient: 'Takumi Hoshizaki',
    subject: 'Sling strap rubs the neck',
    lines: [
      [2, '19:05', 'patient', 'The strap rubs my neck raw by the evening.'],
      [
        1,
        '8:50',
        'dov',
        'Put a folded washcloth under it and move the pad toward the shoulder. If the skin opens, send a word and leave the cloth off.',
      ],
    ],
  },
  {
    patient: 'Salvatore Cacciaguerra',
    subject: 'Pruning the roses',
    lines: [
      [
        0,
        '8:35',
        'patient',
        'Only the low ones, with the good hand, and my grandson holds the branch. Am I allowed?',
      ],
    ],
    isUnread: true,
  },
];
