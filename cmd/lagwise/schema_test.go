package main

import (
	"bytes"
	"os"
	"path/filepath"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
)

// The schemas in testdata are written from the description of the output, not
// from the output; whatever a command writes has to fit them, no key more and
// no key less.

func fits(t *testing.T, schema, text string) {
	t.Helper()
	compiled, err := jsonschema.NewCompiler().Compile("testdata/" + schema + ".schema.json")
	if err != nil {
		t.Fatal(err)
	}
	value, err := jsonschema.UnmarshalJSON(bytes.NewReader([]byte(text)))
	if err != nil {
		t.Fatal(err)
	}
	if err := compiled.Validate(value); err != nil {
		t.Errorf("%#v", err)
	}
}

func TestOutputFitsItsSchema(t *testing.T) {
	fits(t, "review", lagwise(t, exitHeld, "review", "--as", "json", estuary))
	fits(t, "compute", lagwise(t, exitFine, "compute", "--as", "json", estuary))
	fits(t, "screen", lagwise(t, exitFine, "screen", "--as", "json", estuary))
	fits(t, "grounds", lagwise(t, exitFine, "grounds", "--as", "json"))
	fits(t, "grounds", lagwise(t, exitFine, "grounds", "--as", "json", "shared-drift"))
}

// A lab in which hardly anything can be computed.
func TestOutputOfTroubleFitsItsSchema(t *testing.T) {
	folder := t.TempDir()
	for name, text := range map[string]string{
		"shore.csv": "year,eelgrass,boats,flag\n1967,3,1,2\n1968,4,1,2\n",
		"shore.series.toml": "[record.shore]\nfile = \"shore.csv\"\n[record.lost]\nfile = \"lost.csv\"\n" +
			"[series.eelgrass]\nrecord = \"shore\"\n[series.boats]\nrecord = \"shore\"\n[series.rain]\nrecord = \"lost\"\n",
		"a.analysis.toml": "[[correlation]]\nname = \"short\"\nbetween = [\"eelgrass\", \"boats\"]\n[[correlation]]\nname = \"lost\"\nbetween = [\"eelgrass\", \"rain\"]\n" +
			"[[correlation]]\nname = \"unknown\"\nbetween = [\"eelgrass\", \"boat\"]\n[[regression]]\nname = \"fit\"\nresponse = \"eelgrass\"\npredictors = [\"boats\"]\n",
		"b.analysis.toml": "[[correlation]\n",
	} {
		if err := os.WriteFile(filepath.Join(folder, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	fits(t, "review", lagwise(t, exitHeld, "review", "--as", "json", folder))
	fits(t, "compute", lagwise(t, exitHeld, "compute", "--as", "json", folder))
	fits(t, "screen", lagwise(t, exitFine, "screen", "--as", "json", folder))
	empty := t.TempDir()
	fits(t, "review", lagwise(t, exitFine, "review", "--as", "json", empty))
	fits(t, "compute", lagwise(t, exitFine, "compute", "--as", "json", empty))
	fits(t, "screen", lagwise(t, exitFine, "screen", "--as", "json", empty))
}
