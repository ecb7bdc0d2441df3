/* global module */
// In place of @stdlib/assert-has-generator-support, which asks by eval; our content policy forbids eval, and every browser
// that runs these pages has generators.
module.exports = () => true;
