import lot from './lot';
import list from './lots-list';
import register from './lots-register';

export default {
  lot,
  list,
  register,
};
