package mission_test
import ("testing";"encoding/json";"os";"fmt";"legwright/internal/perf/project";"legwright/internal/perf/mission")
func TestDump(t *testing.T){
 b,_:=os.ReadFile("../../../testdata/reference/mission_scipy.json")
 var s project.Spec
 if err:=json.Unmarshal(b,&s);err!=nil{t.Fatal(err)}
 p,err:=s.Build(); if err!=nil{t.Fatal(err)}
 for i,a:=range p.Aircraft{
  f:=mission.Fly(a,&p.Plan)
  fmt.Println("variant",i,f.Failure,f.Reserve)
  for _,l:=range f.Legs{ fmt.Printf("%-14s t %.6f d %.4f fuel %.8f alt %.4f  V %.5f %.5f\n",l.Leg.Name,l.Time,l.Distance,l.Fuel,l.End.Altitude,l.Start.TAS,l.End.TAS)
   if l.Run!=nil { fmt.Printf("  ground %.5f total %.5f\n",l.Run.Ground,l.Run.Total)
    for _,s:=range l.Run.Segments {fmt.Printf("    %s %.6f %.6f %.8f\n",s.Name,s.Distance,s.Time,s.Fuel)}}
  }
  fmt.Println(f.Tightest.Ratio())
 }
}
