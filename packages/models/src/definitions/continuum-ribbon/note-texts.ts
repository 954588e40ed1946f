/** Sentences of the notes; {value} and {limit} become formatted quantities. */
export const noteTexts: { [code: string]: string } = {
  'sign-zero': 'The mass outside needs a sign: +1 or −1.',
  'dimer-lines-need-armchair': 'A width in dimer lines belongs to an armchair edge; give chains or nm.',
  'chains-need-zigzag': 'A width in zigzag chains belongs to a zigzag edge; give dimer lines or nm.',
  'armchair-mixes-valleys': 'An armchair edge mixes the valleys: they can only be computed both at once.',
  'armchair-needs-even-cells': 'The unfolded armchair ring needs an even number of cells; {value} is odd.',
  'field-must-average': 'A periodic strip needs a field that averages to zero; here the mean is {value}.',
  'window-empty': 'The window begins at {value} and ends at {limit}: it holds nothing.',
  'count-beyond-grid': '{value} levels were asked for; this grid can prove {limit}. Take more cells.',
  'state-beyond-axis': 'There is no wave number with index {value}; the last is {limit}.',
  'states-must-increase': 'The indices of the states must increase.',
  'cone-one-percent':
    'Energies reach {value}. Above {limit} a honeycomb with t = 2.7 eV differs from the cone by more than 1 %.',
  'cone-five-percent':
    'Energies reach {value}. Above {limit} a honeycomb with t = 2.7 eV differs from the cone by more than 5 %.',
  'grid-coarse':
    'The coarsest grid has {value} cells per shortest wavelength; below {limit} the extrapolation may not hold.',
  'no-error-estimate': 'One grid gives no error estimate; take three to have one.',
  'steps-converge-unevenly':
    'Step edges lie between grid sites: levels may converge unevenly and then carry the last difference as their error.',
  'strain-past-first-order':
    'The gauge field reaches {value}. Past {limit} (3 % strain) its first-order formula is off by several per cent.',
  'strain-past-limit':
    'The gauge field reaches {value}. Past {limit} the strain exceeds 20 %, which the sheet may not bear.',
  'width-near-bonds': 'The strip is {value} wide, under ten bond lengths ({limit}): the continuum does not hold.',
  'length-near-bonds': 'The magnetic length is {value}, under ten bond lengths ({limit}): the continuum does not hold.',
  'length-near-step': 'The magnetic length {value} is under eight steps of the finest grid ({limit}): take more cells.',
  'no-room-for-orbits':
    'The strip is {value} wide, under four magnetic lengths ({limit}): no level of the bulk forms in it.',
  'family-metallic': 'N = {value} is 3p + 2: without field, mass and strain the ribbon has no gap.',
  'family-gapped': 'Without field, mass and strain the gap of this family is {value}.',
  'one-way-mode': 'Opposite walls hold one mode that runs one way through the gap: no gap is returned.',
  'no-gap-from-one-k': 'With {value} wave number there is neither a gap nor a channel count.',
  'zero-not-on-axis': 'An even count of {value} leaves out k = 0; take {limit}.',
  'axis-not-increasing': 'The wave numbers do not increase: neither a gap nor channels are returned.',
  'channels-outside-window': 'Channels are asked for at {value}, and the window ends at {limit}: those stay empty.',
};
