import { consentFormSchema, type ConsentForm } from '@/lib/protocol/document';

/** Consent form 1.0 of the invented study, in our own plain words: seven parts, key information first. */
export const consentForm: ConsentForm = consentFormSchema.parse({
  title: 'Steady Lift: taking part',
  sections: [
    {
      key: 'key-facts',
      title: 'The main points',
      paragraphs: [
        'We ask you to join a study about lifting weights after breast cancer. We want to know how often the arm swells, and what people lifted before it did.',
        'It is your choice. You can say no, and you can stop on any day. Your care stays the same.',
        'You will be in the study for two years. You will have seven visits. At home you note what you lift, twice a week.',
        'The main risk is that your arm may swell, or swell more. This can happen with or without lifting. We watch your arm so that a change is seen early.',
      ],
    },
    {
      key: 'why',
      title: 'Why we do this study',
      paragraphs: [
        'After breast cancer some people get swelling in the arm. The medical word is lymphoedema.',
        'For years people were told not to lift. Many teams now think that starting light and going up slowly is safe. We need good records to find out if that is true.',
        'This study has no second group to compare with. It will show what happened to those who took part. It cannot prove by itself that lifting caused it.',
      ],
    },
    {
      key: 'what-you-do',
      title: 'What you will do',
      paragraphs: [
        'At each visit we measure both arms with a tape, we weigh you, and we use a small current that you do not feel. A visit takes about 45 minutes.',
        'You train twice a week. Each time you first tell us how your arm is. Then you note what you lifted, how often, and how hard it was.',
        'Before or after a visit you answer a few short sets of questions online. You may leave out any question.',
        'If your arm changes, you tell us in the log. Then you hold your training until we have seen your arm.',
      ],
    },
    {
      key: 'risks',
      title: 'Risks and what to do',
      paragraphs: [
        'Your muscles may be sore for some days. That is common and it passes.',
        'Your arm may swell. Tell us if it feels fuller, heavier or tighter and this is still so the next day.',
        'A hot, red or sore arm, sudden swelling, fever, chest pain or trouble breathing cannot wait for us. Get medical care at once. Nobody reads the log around the clock.',
        'The study does not take the place of advice from your doctor or your therapist.',
      ],
    },
    {
      key: 'good-it-may-do',
      title: 'What good it may do',
      paragraphs: [
        'You may get stronger, and your arm is measured often. We cannot promise that it will help you.',
        'What we learn may help other people after you.',
      ],
    },
    {
      key: 'your-data',
      title: 'Your data',
      paragraphs: [
        'Your name, address and date of birth are seen only by the team at your own clinic. Everyone else sees a code in place of your name.',
        'We keep a record of each change: who made it, when, and why. Nobody can wipe it out.',
        'We share results for groups of people. If you agree below, others may use your data for research, without your name.',
        'You may ask to see what we hold about you, and ask us to put right what is wrong.',
      ],
    },
    {
      key: 'stopping',
      title: 'If you want to stop',
      paragraphs: [
        'You can stop on any day, and you need not say why. Tell your clinic, or do it in the app.',
        'You choose how far to stop. You may stop the training and still come to visits. You may stop the visits too. Or you may ask us to collect nothing more.',
        'What we hold up to then stays in the study, so that the results stay true. You can ask your clinic what the law in your country says about taking it out.',
      ],
    },
  ],
  statements: [
    { key: 'read', text: 'I have read this, or it was read to me, and my questions were answered.' },
    { key: 'free', text: 'I know that I can say no or stop, and that my care stays the same.' },
    { key: 'measure', text: 'I agree to visits, to having both arms measured, and to my answers being kept.' },
    { key: 'urgent', text: 'I know that nobody reads the log around the clock, and what to do when it is urgent.' },
  ],
  permissions: [
    { key: 'future-contact', text: 'You may ask me about other studies later.' },
    { key: 'data-sharing', text: 'Other researchers may use my data, without my name.' },
    { key: 'linkage', text: 'You may link my data with my hospital record.' },
  ],
});
