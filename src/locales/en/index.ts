import common from './common';
import frame from './frame';
import auth from './auth';
import account from './account';
import work from './work';
import lots from './lots';
import holds from './holds';
import criteria from './criteria';
import parts from './parts';
import receivers from './receivers';
import suppliers from './suppliers';
import benches from './benches';
import people from './people';
import history from './history';
import mail from './mail';
import upload from './upload';

/** English, one file an area. Another language is a folder beside this one with the same files. */
export default {
  ...common,
  frame,
  auth,
  account,
  work,
  lots,
  holds,
  criteria,
  parts,
  receivers,
  suppliers,
  benches,
  people,
  history,
  mail,
  upload,
};
