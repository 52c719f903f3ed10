/** Eight weeks of questions and answers in one thread, so that a long one can be scrolled. */
export const eightWeeks: readonly (readonly [asked: string, answered: string])[] = [
  [
    'Home since yesterday. How tight should the strap be?',
    'Two fingers must fit under it, and the elbow sits in the corner.',
  ],
  [
    'The hand is puffy in the evening.',
    'Squeeze the ball every hour you are awake, and rest the forearm on a pillow.',
  ],
  ['Ball squeezed, ten times an hour. Puffy still, less.', 'That is the direction we want. Keep going.'],
  [
    'Can I take the sling off to eat?',
    'With the elbow at your side and the forearm on the table, yes. Not to reach for the salt.',
  ],
  [
    'The elbow bend pulls in the front.',
    'Go only as far as it pulls lightly. It should be easier in three days.',
  ],
  ['Easier, as you said.', 'Good. Now all the way straight as well, slowly.'],
  [
    'How do I sleep without sliding down?',
    'A pillow under the knees and one behind the elbow, so that you can see it.',
  ],
  ['Slept four hours in one go!', 'Wonderful. Same pillows tonight.'],
  ['My scar itches.', 'Itching is skin at work. Hands off, and tell me if it gets red, wet or warm.'],
  [
    'Is the lean on the table meant to be felt in the back?',
    'In the back and the hips, yes. The shoulder only comes along.',
  ],
  [
    'Twenty leans, four times. Too many?',
    'Exactly as planned. Stop at fifteen when it aches the next morning.',
  ],
  ['It did ache a bit, so fifteen.', 'Well judged. Back to twenty when two mornings were quiet.'],
  ['May I carry a cup to the table?', 'A cup at the waist, elbow at the side. Nothing heavier.'],
  ['The shoulder blade exercise: down and in, or in and down?', 'Down first, then in. Small, no shrugging.'],
  ['My husband says I shrug.', 'Then let him watch, and do it in front of the mirror.'],
  ['No more shrugging, he says.', 'He may keep the job.'],
  ['When do we start with the wall press?', 'After Tuesday, when I have seen you. Light as a handshake.'],
  ['Five presses, five seconds each, no pain.', 'Right on it. Same for the rest of the week.'],
  [
    'The weather makes the joint heavy.',
    'Many say so. Warm shirt, same exercises, and tell me if it is more than heavy.',
  ],
  ['Only heavy. Gone today.', 'Good to know. I have written it down.'],
  ['Six weeks tomorrow. What changes?', 'Nothing until you are here. Then we go through the list together.'],
  [
    'Strange without the sling. The arm feels long.',
    'It will for some days. Pocket or waistband in a crowd, so that people give you room.',
  ],
  ['How high may I lift it myself?', 'To the height of the breast pocket for now, thumb up, bent elbow.'],
  ['Breast pocket reached, ten times.', 'That is this week’s goal. Leave it there.'],
  [
    'I hung a towel. Was that too much?',
    'Wet towels are heavier than they look. Dry ones only, please, and below the shoulder.',
  ],
  ['It aches since the towel.', 'Then two quiet days: half the repetitions, ice twice.'],
  ['Better, about as before.', 'Then back to the plan from tomorrow.'],
  [
    'Pain 4 again this morning, after gardening with the left hand.',
    'Rest it today and look at the hold-off list again: pulling weeds is pulling.',
  ],
  ['You are right. No weeds.', 'The weeds will wait. I look at the curve with you at the visit.'],
  [
    'Shall I come earlier than Thursday?',
    'Thursday is fine as long as it stays under 5. Check in each morning, and ring us if something new comes.',
  ],
];
