/** Somebody of the demo. All of them, their firms and their addresses are invented; `.example` is reserved (RFC 2606). */
export interface Person {
  name: string;
  email: string;
  position: string;
}

const person = (name: string, email: string, position: string): Person => ({ name, email, position });

export const studio = {
  name: 'Harrow Lane Studio',
  owner: person('Wren Halloway', 'wren@harrow-lane.example', 'Photographer'),
  assistant: person('Tobias Fenn', 'tobias@harrow-lane.example', 'Assistant'),
};

export const architects = {
  name: 'Tarn Brandreth Architects',
  remarks: 'Upright lines upright, please. Ines decides, Oskar minds the drawings.',
  people: {
    ines: person('Ines Okafor', 'ines.okafor@tarn-brandreth.example', 'Partner'),
    oskar: person('Oskar Lind', 'oskar.lind@tarn-brandreth.example', 'Project architect'),
    mirelle: person('Mirelle Bax', 'mirelle.bax@tarn-brandreth.example', 'Communications'),
  },
};

export const harbourTrust = {
  name: 'Vessmouth Harbour Trust',
  remarks: 'Swing Bridge opens at the full hour; ask the bridge master for the gate.',
  people: {
    runa: person('Runa Castellan', 'runa.castellan@harbour-trust.example', 'Head of works'),
    piet: person('Piet Aldous', 'piet.aldous@harbour-trust.example', 'Bridge engineer'),
    saskia: person('Saskia Morrow', 'saskia.morrow@harbour-trust.example', 'Press office'),
  },
};

export const council = {
  name: 'Vessmouth City Council',
  remarks: 'Orders by the number of the annual report.',
  people: {
    halina: person('Halina Strand', 'halina.strand@vessmouth-council.example', 'Annual report'),
    emeric: person('Emeric Vale', 'emeric.vale@vessmouth-council.example', 'Layout'),
  },
};

export const visit = {
  name: 'Visit Vessmouth',
  remarks: '',
  people: {
    dorian: person('Dorian Quill', 'dorian.quill@visit-vessmouth.example', 'Campaigns'),
    lotte: person('Lotte Harker', 'lotte.harker@visit-vessmouth.example', 'Picture desk'),
  },
};

export const homes = {
  name: 'Pell & Quarry Homes',
  remarks: 'Site visits with hard hat and a day’s notice.',
  people: { judith: person('Judith Pell', 'judith.pell@pell-quarry.example', 'Sales') },
};
