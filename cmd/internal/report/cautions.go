package report

// Cautions returns what every output carries.
func Cautions() []string {
	return []string{
		"A preliminary sizing aid for use by a competent engineer, who must check what it says before anything is built.",
		"A limit-equilibrium result is only as good as its ground and water model.",
		"Two-dimensional; deformation, settlement and neighbouring structures are not looked at.",
		"Local codes and licensed practice govern.",
		"Temporary works, the upkeep of drains and monitoring need their own design.",
		"A slope that is moving calls for evacuation and monitoring first.",
	}
}
