/** Every address of the application. Nothing else spells one out. */
export const paths = {
  home: '/',
  register: '/register',
  registerWith: (email: string) => `/register?${new URLSearchParams({ email }).toString()}`,
  registered: '/registered',
  signIn: '/sign-in',
  signInLink: '/sign-in/link',
  signOut: '/sign-out',
  forgotten: '/forgotten',
  account: '/account',
  /** Which mail the person wants. */
  accountMail: '/account/mail',
  unsubscribe: (token: string) => `/unsubscribe/${token}`,
  confirmMail: (secret: string) => `/confirm/${secret}`,
  useSignInLink: (secret: string) => `/sign-in/link/${secret}`,
  resetPassword: (secret: string) => `/reset/${secret}`,
  joinCrew: (secret: string) => `/join/${secret}`,

  windows: '/windows',
  windowsWith: (
    stationIds: readonly string[],
    band?: string,
    dates?: { from: string; days: number },
  ) =>
    `/windows?${new URLSearchParams([
      ...stationIds.map((id) => ['station', id]),
      ...(band ? [['band', band]] : []),
      ...(dates
        ? [
            ['from', dates.from],
            ['days', String(dates.days)],
          ]
        : []),
    ]).toString()}`,
  /** The year ahead, between two regions, stations or places. */
  outlook: '/outlook',
  outlookBetween: (here: string, there: string, band: string) =>
    `/outlook?${new URLSearchParams({ here, there, band }).toString()}`,

  skeds: '/skeds',
  skedFile: (id: string) => `/skeds/${id}/sked.ics`,
  sked: (id: string) => `/skeds/${id}`,
  /** Page that asks for words and a second press: decline, drop out, withdraw or cancel. */
  skedStep: (id: string, step: 'decline' | 'drop-out' | 'withdraw' | 'cancel') =>
    `/skeds/${id}/${step}`,
  /** With the ledgers of two of its stations. */
  skedPair: (id: string, first: string, second: string) =>
    `/skeds/${id}?pair=${encodeURIComponent(`${first},${second}`)}#pair-heading`,
  skedMove: (id: string) => `/skeds/${id}/move`,
  /** Everything for the hour itself, to print or to keep offline. */
  skedSheet: (id: string) => `/skeds/${id}/sheet`,
  skedLive: (id: string) => `/skeds/${id}/live`,
  /** The Moon's track as CSV; without a station the viewer's own. */
  skedTrack: (id: string, stationId?: string, stepS?: number) => {
    const query = new URLSearchParams({
      ...(stationId ? { station: stationId } : {}),
      ...(stepS ? { step: String(stepS) } : {}),
    }).toString();
    return `/skeds/${id}/track.csv${query ? `?${query}` : ''}`;
  },
  /** The script that keeps sheets, and what it watches over. */
  sheetKeeper: '/skeds/keeper.js',
  sheetKeeperScope: '/skeds/',
  skedTalk: (id: string) => `/skeds/${id}#talk`,
  skedReport: (id: string) => `/skeds/${id}#report`,
  live: '/live',
  /** For somebody without an account: one sked, one person. */
  answer: (secret: string) => `/answer/${secret}`,
  /** Page on which the other common windows and own limits stand. */
  answerMove: (secret: string) => `/answer/${secret}/move`,
  /** Ends all mail to somebody without an account. */
  noMore: (token: string) => `/no-more/${token}`,
  /** Offer to somebody without an account, as one plain form. */
  newGuest: '/skeds/new-guest',
  calendar: '/calendar',
  feed: (secret: string) => `/feeds/${secret}.ics`,

  activities: '/activities',
  newActivity: '/activities/new',
  activity: (slug: string) => `/activities/${slug}`,
  activitySettings: (slug: string) => `/activities/${slug}/settings`,
  /** Where the coordinator works, step by step. */
  activityRoster: (slug: string) => `/activities/${slug}/roster`,
  activityImport: (slug: string) => `/activities/${slug}/import`,
  activityWishes: (slug: string, band?: string) =>
    `/activities/${slug}/wishes${band ? `?${new URLSearchParams({ band }).toString()}` : ''}`,
  activityPlan: (slug: string) => `/activities/${slug}/plan`,
  activityPublish: (slug: string) => `/activities/${slug}/publish`,
  /** Where the plan is moved about by hand. */
  activityTimetable: (slug: string) => `/activities/${slug}/timetable`,
  /** The published plan as one station sees it. */
  activityStation: (slug: string, callSign: string) =>
    `/activities/${slug}/stations/${encodeURIComponent(callSign)}`,
  activityRevision: (slug: string, number: number) => `/activities/${slug}/revisions/${number}`,
  activityCalendar: (slug: string) => `/activities/${slug}/calendar.ics`,
  activityStationCalendar: (slug: string, callSign: string) =>
    `/activities/${slug}/stations/${encodeURIComponent(callSign)}/calendar.ics`,
  /** Where the crew of a station answers; the coordinator for any station. */
  activityAnswer: (slug: string, stationId?: string) =>
    `/activities/${slug}/answer${stationId ? `?${new URLSearchParams({ station: stationId }).toString()}` : ''}`,
  /** The answer of somebody without an account. */
  rosterAnswer: (secret: string) => `/roster/${secret}`,

  stations: '/stations',
  newStation: '/stations/new',
  station: (id: string) => `/stations/${id}`,
  stationPlace: (id: string) => `/stations/${id}/place`,
  stationSky: (id: string) => `/stations/${id}/sky`,
  stationEquipment: (id: string) => `/stations/${id}/equipment`,
  /** Where the exposure estimate of a band stands. */
  stationExposure: (id: string, band: string) => `/stations/${id}/equipment#exposure-${band}`,
  stationHours: (id: string) => `/stations/${id}/hours`,
  stationCrew: (id: string) => `/stations/${id}/crew`,
  stationProfile: (id: string) => `/stations/${id}/profile`,

  people: '/admin/people',
  /** Shown in place of a page that failed, never linked to. */
  problem: '/problem',
  method: '/method',
  methodPart: (anchor: string) => `/method#${anchor}`,
  help: (slug: string) => `/help/${slug}`,

  api: {
    moon: '/api/v1/moon',
    windows: '/api/v1/windows',
    outlook: '/api/v1/outlook',
    searchData: '/api/v1/stations/search-data',
    link: '/api/v1/link',
    openapi: '/api/v1/openapi.json',
    stations: '/api/v1/stations',
    station: (id: string) => `/api/v1/stations/${id}`,
    stationPlace: (id: string) => `/api/v1/stations/${id}/place`,
    stationSky: (id: string) => `/api/v1/stations/${id}/sky`,
    stationEquipment: (id: string) => `/api/v1/stations/${id}/equipment`,
    stationNoise: (id: string) => `/api/v1/stations/${id}/noise`,
    stationNoiseRecord: (id: string, recordId: string) =>
      `/api/v1/stations/${id}/noise/${recordId}`,
    stationHours: (id: string) => `/api/v1/stations/${id}/hours`,
    stationProfile: (id: string) => `/api/v1/stations/${id}/profile`,
    stationInvitations: (id: string) => `/api/v1/stations/${id}/invitations`,
    stationInvitation: (id: string, invitationId: string) =>
      `/api/v1/stations/${id}/invitations/${invitationId}`,
    stationCrew: (id: string) => `/api/v1/stations/${id}/crew`,
    stationCrewMember: (id: string, personId: string) => `/api/v1/stations/${id}/crew/${personId}`,
    skeds: '/api/v1/skeds',
    sked: (id: string) => `/api/v1/skeds/${id}`,
    skedMove: (id: string) => `/api/v1/skeds/${id}/move`,
    skedAccept: (id: string) => `/api/v1/skeds/${id}/accept`,
    skedDecline: (id: string) => `/api/v1/skeds/${id}/decline`,
    skedDropOut: (id: string) => `/api/v1/skeds/${id}/drop-out`,
    skedWithdraw: (id: string) => `/api/v1/skeds/${id}/withdraw`,
    skedCancel: (id: string) => `/api/v1/skeds/${id}/cancel`,
    skedReport: (id: string) => `/api/v1/skeds/${id}/report`,
    skedSheet: (id: string) => `/api/v1/skeds/${id}/sheet`,
    clock: '/api/v1/clock',
    skedMessages: (id: string) => `/api/v1/skeds/${id}/messages`,
    calendar: '/api/v1/calendar',
    /** The draft of its plan, as the timetable changes it. */
    activityDraft: (slug: string) => `/api/v1/activities/${slug}/draft`,
    activityPlan: (slug: string) => `/api/v1/activities/${slug}/plan`,
    /** Where a mail server hands in the mails that answer ours. */
    inboundMail: '/api/v1/inbound/mail',
  },
} as const;
