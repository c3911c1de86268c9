package lipid_test

import (
	"fmt"

	"gramlaw/internal/lipid"
)

func ExampleParse() {
	for _, notation := range []string{"C18:1n9c", "F22D6N3", "18:1 t", "CLA"} {
		s, err := lipid.Parse(notation)
		if err != nil {
			fmt.Println(err)
			continue
		}
		fmt.Printf("%v group=%v %q\n", s, s.IsGroup(), s.Trivial())
	}
	// Output:
	// FA 18:1(9Z) group=false "oleic"
	// FA 22:6(4Z,7Z,10Z,13Z,16Z,19Z) group=false "docosahexaenoic"
	// 18:1 trans group=true ""
	// 18:2 conjugated group=true ""
}

func ExampleClass_Holds() {
	isolated := false
	trans, err := lipid.Predicate{Any: "trans", Conjugated: &isolated}.Compile()
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, notation := range []string{"18:1 t", "18:1", "9c,11t-18:2"} {
		s, _ := lipid.Parse(notation)
		fmt.Println(notation, trans.Holds(s))
	}
	// Output:
	// 18:1 t yes
	// 18:1 open
	// 9c,11t-18:2 no
}
