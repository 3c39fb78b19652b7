package remedies

import "errors"

var errNotYet = errors.New("remedies: not built yet")

func newRegrade(*Job, *Request) (Remedy, error)       { return nil, errNotYet }
func newUnload(*Job, *Request) (Remedy, error)        { return nil, errNotYet }
func newBerm(*Job, *Request) (Remedy, error)          { return nil, errNotYet }
func newButtress(*Job, *Request) (Remedy, error)      { return nil, errNotYet }
func newTrenchDrains(*Job, *Request) (Remedy, error)  { return nil, errNotYet }
func newWaterLowering(*Job, *Request) (Remedy, error) { return nil, errNotYet }
