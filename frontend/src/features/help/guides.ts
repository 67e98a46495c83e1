import type { Role } from '@stayledger/shared/permissions/permissions';
import { paths } from '../../app/paths';

export interface GuideStep {
  title: string;
  text: string;
  /** Page on which the step is done. */
  link?: { to: string; label: string };
}

export interface Guide {
  role: Role;
  title: string;
  comesFor: string;
  steps: GuideStep[];
}

const fleet = { to: paths.fleet.pattern, label: 'Open the fleet' };
const reference = { to: paths.reference.pattern, label: 'Open the reference data' };

/** A short guide for each role: what they come for, step by step. */
export const GUIDES: readonly Guide[] = [
  {
    role: 'rigger',
    title: 'For riggers',
    comesFor: 'Keep the register of each rig, bring in what was recorded, and know what is due.',
    steps: [
      {
        title: 'Register the vessel and her rig',
        text: 'Start from the type of the rig, from a file, or from a sister vessel; then fit the part that hangs at each place: construction, diameter, ends, thread, fitting day. What you do not know stays empty; the page says what is assumed instead, and that is always the weaker figure.',
        link: { to: paths.registerVessel.pattern, label: 'Register a vessel' },
      },
      {
        title: 'List the sensors',
        text: 'Which pin, link or gauge measures which place, from when, and when its zero was last checked. A part nobody measures may be mirrored from the other side; the rig page says where the loads of each part come from and what would better it.',
      },
      {
        title: 'Add a load log',
        text: 'Drop the file the logger wrote. Check the units and say which column was measured where; the next log of this vessel is matched by itself. You may leave the page while it uploads and counts.',
        link: fleet,
      },
      {
        title: 'Review it, then post it or set it aside',
        text: 'Read the findings first: they say what is wrong with the recording and where. A log counts for nothing until somebody posts it to the ledger, and a log that is set aside keeps its reason.',
      },
      {
        title: 'Read the dates with the rule beside them',
        text: 'The earliest rule governs and is named. A low allowance never puts off the calendar rule, a limit of the builder or one of the insurer.',
      },
      {
        title: 'Plan the visits',
        text: 'The re-rig schedule of a vessel puts parts that fall due into as few visits as pay. Each task says why it falls there.',
      },
      {
        title: 'Add what your firm knows',
        text: 'A maker’s table or tests of your own become a construction or a curve of your firm. Give the source: whoever reads a part it was used on sees where it came from.',
        link: reference,
      },
    ],
  },
  {
    role: 'surveyor',
    title: 'For surveyors',
    comesFor: 'Judge what a season of loads used up, and say how sure that is.',
    steps: [
      {
        title: 'Start from the work due',
        text: 'Parts over or near their date stand first, then logs that wait for a decision. Filter for parts not assessed: silence about a part is not good news.',
        link: fleet,
      },
      {
        title: 'Look at the recording before the result',
        text: 'Gaps, flat stretches, jumps of the zero and too slow sampling are named on the review page with their place. What they mean for the damage is your judgement.',
      },
      {
        title: 'Follow a figure to its source',
        text: 'On the page of a part each ledger entry names the log, the curve and its version. “Show the working” evaluates the equations again before your eyes.',
      },
      {
        title: 'Know what the curve was made on',
        text: 'Most curves were measured on other things than a yacht’s rigging. The page of a curve says on what, how it was read, and how far that is from the part.',
        link: reference,
      },
    ],
  },
  {
    role: 'owner',
    title: 'For owners',
    comesFor: 'Know what is due on your rig, by when, and why.',
    steps: [
      {
        title: 'Read what is due',
        text: 'Your first page names each part that is due within a year, with the reason in one sentence. What nobody knows about stands there as well.',
        link: { to: paths.myVessel.pattern, label: 'Open my vessel' },
      },
      {
        title: 'Say how much you will sail',
        text: 'A part’s allowance is used up by sailing. The hours you plan turn what is left into a date, and a new plan moves it.',
      },
      {
        title: 'Send in what your logger recorded',
        text: 'You may add a load log yourself. The firm that looks after your rig reviews it before it counts.',
      },
      {
        title: 'See what is planned',
        text: 'The page of your vessel has a re-rig schedule: which visit takes which parts, why then, and what it is expected to cost.',
      },
      {
        title: 'Keep looking at the rig',
        text: 'A broken wire, a crack, a bent screw or a rust streak at an end finishes a part whatever is written here. After a grounding, a knock-down or lightning have the rig looked at first.',
      },
    ],
  },
  {
    role: 'insurer',
    title: 'For insurers',
    comesFor: 'Read the fatigue report before renewal and see what it rests on.',
    steps: [
      {
        title: 'Read what is shared with you',
        text: 'You see the signed reports of vessels whose owners share them with your firm, until that grant ends, and nothing else of those vessels.',
        link: { to: paths.portfolio.pattern, label: 'Open the portfolio' },
      },
      {
        title: 'Read what is not assessed first',
        text: 'Provisional and not assessed parts are counted beside the assessed ones. A date that hangs on an estimate says so.',
      },
      {
        title: 'Check the ground it stands on',
        text: 'Curves and their sources are open to you, with the versions accounts were posted with.',
        link: reference,
      },
    ],
  },
  {
    role: 'administrator',
    title: 'For administrators',
    comesFor: 'Keep the service running and know who did what.',
    steps: [
      {
        title: 'People and firms',
        text: 'Roles come from a firm. Which vessels somebody sees is decided by grants on the vessel, never here.',
        link: { to: paths.administration.pattern, label: 'Open the administration' },
      },
      {
        title: 'Background jobs',
        text: 'A job that failed says why. Jobs that a stopped process held are taken up again by themselves.',
      },
      {
        title: 'The audit trail',
        text: 'Sign-ins, changes and postings, newest first. What was done on a vessel stays with those who reach that vessel.',
      },
    ],
  },
];
