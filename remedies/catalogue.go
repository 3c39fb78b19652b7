package remedies

// Catalogue returns the remedies that can be asked for, in the order in which they are listed. Adding a remedy is one file and one
// line here.
func Catalogue() []Kind {
	return []Kind{
		regradeKind(),
		unloadKind(),
		bermKind(),
		buttressKind(),
		lightweightKind(),
		shearKeyKind(),
		trenchDrainsKind(),
		drilledDrainsKind(),
		toeDrainKind(),
		interceptorKind(),
		elementsKind(),
		waterLoweringKind(),
	}
}

// Find returns the kind of that name and reports whether there is one.
func Find(name string) (Kind, bool) {
	for _, k := range Catalogue() {
		if k.Name == name {
			return k, true
		}
	}
	return Kind{}, false
}
