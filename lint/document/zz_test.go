package document
import ("testing";"fmt";"sort")
func TestDump(t *testing.T){ ts:=suite(t,"invalid/","1.1.0"); var ns []string; for n:=range ts{ns=append(ns,n)}; sort.Strings(ns)
for _,n:=range ns { tr:=Parse(ts[n]); if len(tr.Problems)>1 {fmt.Printf("## %s\n%s\n", n, ts[n])}; for _,p:=range tr.Problems{ r:=tr.Raw(p.At); if len(r)>40{r=r[:40]+"…"}; fmt.Printf("%q: %s\n", r,p.Message)}}}
